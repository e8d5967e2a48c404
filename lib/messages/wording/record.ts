import { formatDuration, formatRateRange, formatTemperature, formatVacuum, fromPa } from '@/shared/units'
import type { Units } from '@/shared/schemas/people'
import type { NoticeKind } from '@/shared/schemas/words'
import type { RecordEvidence } from '@/lib/messages/evidence'
import type { Wording } from '@/lib/messages/wording/types'

type Words = Pick<Wording, 'subject' | 'finding' | 'sureness' | 'steps'> & {
  caution?: string
  text: string
}
type Write = (evidence: RecordEvidence, units: Units) => Words

const CUP =
  'Put a cup of water in each bowl after a flush has ended and the pump has stopped: if the pump then stays off longer, a bowl seal is dry or worn.'
const BREAKER =
  'Switch the pump off at its own breaker, never one that feeds a bilge pump, and tell everybody aboard.'
const CALL = 'Ask for a visit.'

/** "2.1 to 2.4 h", or the one figure there is. */
const holdText = (evidence: RecordEvidence): string => formatDuration(evidence.holdSeconds)

/** One entry a kind: what is told when a notice opens or has got worse. */
export const WORDS: Record<Exclude<NoticeKind, 'night-warning'>, Write> = {
  'short-hold': (evidence) => ({
    subject: `the pump now rests only ${holdText(evidence)} between runs`,
    finding: `When nobody flushes the pump now runs every ${holdText(evidence)}; it should rest at least ${formatDuration(evidence.limitSeconds)}. Air leaks in.`,
    sureness:
      evidence.holdHighSeconds == null
        ? `Seen in ${evidence.holds ?? 3} rests of the pump.`
        : `Between ${formatDuration(evidence.holdLowSeconds)} and ${formatDuration(evidence.holdHighSeconds)} (95 %).`,
    steps: [CUP, CALL],
    text: `pump runs by itself every ${holdText(evidence)}, air leaks in. Reply VISIT to ask your shop.`,
  }),
  'short-cycling': (evidence) => ({
    subject: 'the pump starts again every few minutes',
    finding: `The pump starts again by itself every ${holdText(evidence)}. It will wake people, drain the battery and wear out.`,
    sureness: `Seen in the last ${evidence.holds ?? 3} rests of the pump.`,
    steps: ['Look for a bowl valve that hangs open, and flush each head once.', CUP, BREAKER, CALL],
    text: `pump starts every ${holdText(evidence)}. Flush each head once, look for a bowl valve hung open. VISIT or OFF?`,
  }),
  'running-on': (evidence) => ({
    subject: 'the pump does not stop',
    finding: `The pump has been running${evidence.sinceLocal ? ` since ${evidence.sinceLocal}` : ''} and the vacuum does not rise.`,
    sureness: 'It has been on for over twice the time that this tank usually needs.',
    steps: ['Look whether a bowl valve hangs open, and flush that head once.', BREAKER, CALL],
    caution: 'A pump that runs on gets hot. Do not leave it running unattended.',
    text: `pump does not stop and vacuum does not rise. Bowl valve open? Else switch it off at its own breaker. OK or VISIT?`,
  }),
  'no-start': () => ({
    subject: 'the pump did not start after a flush',
    finding: 'Somebody flushed, there is no vacuum, and the pump did not start.',
    sureness: 'The logger hears the system, so it has power itself.',
    steps: [
      'See whether the pump is switched on at its breaker and whether its fuse is whole.',
      'If it was switched off on purpose, say so: reply OFF, or set it on the Tonight page.',
      CALL,
    ],
    text: `no vacuum after a flush and the pump did not start. Breaker or fuse? If off on purpose reply OFF. VISIT?`,
  }),
  'slow-recharge': (evidence, units) => ({
    subject: 'the pump takes longer than usual',
    finding: `The pump now raises ${rechargeText(evidence.rechargePaPerSecond, units)}; usual here is ${rechargeText(evidence.usualRechargePaPerSecond, units)}.`,
    sureness: 'Seen in the last five runs over the same band.',
    steps: ['Look at supply voltage, the pump’s valves and the discharge side.'],
    text: 'pump takes longer than usual to draw down.',
  }),
  'switch-drift': (evidence, units) => ({
    subject: 'the vacuum switch has moved',
    finding: `The switch now starts the pump at ${formatVacuum(evidence.cutInPa, units.vacuum)} and stops it at ${formatVacuum(evidence.cutOutPa, units.vacuum)}, ${formatVacuum(evidence.differentialPa, units.vacuum)} apart; usual is ${formatVacuum(evidence.usualDifferentialPa, units.vacuum)}.`,
    sureness: 'Rests get shorter by this with the leak unchanged.',
    steps: ['Check the switch, its sense line and its setting against a gauge.'],
    text: 'vacuum switch has moved.',
  }),
  step: (evidence, units) => ({
    subject: 'the leak grew at once',
    finding: `The leak went from ${formatRateRange(evidence.fromPaPerHour, evidence.toPaPerHour, units.vacuum)}${between(evidence)}.`,
    sureness: 'A change at once, not a slow one: something was touched, moved or broke about then.',
    steps: ['Ask what was done aboard at that time, and look there first.'],
    text: 'the leak grew at once.',
  }),
  'logger-silent': (evidence) => {
    const since = evidence.sinceLocal ? ` since ${evidence.sinceLocal}` : ''
    if (evidence.loggers === undefined) {
      return {
        subject: 'nothing heard from the logger',
        finding: `Nothing has been heard from the logger${since}. Until it is heard again nothing can be said of the coming nights.`,
        sureness: null,
        steps: [
          'See whether the logger has power and a connection. It keeps its readings and sends them later.',
        ],
        text: 'nothing heard from the logger.',
      }
    }
    const place = evidence.harbour ?? 'one harbour'
    return {
      subject: `${evidence.loggers} loggers in ${place} are silent`,
      finding: `Nothing has been heard from this boat and ${evidence.loggers - 1} others in ${place}${since}. They fell silent together, so the harbour’s network is the likely cause.`,
      sureness: null,
      steps: ['Ask the harbour whether its network works.', 'The fleet page shows which boats are unheard.'],
      text: `${evidence.loggers} loggers in ${place} are silent.`,
    }
  },
  'sensor-fault': (evidence) => ({
    subject: 'the vacuum sensor reads what cannot be',
    finding: `The vacuum sensor cannot be trusted: ${evidence.fault ?? 'it reads what cannot be'}. Figures from it are held back.`,
    sureness: null,
    steps: ['Compare it with a hand gauge; check its line and plug.'],
    text: 'vacuum sensor cannot be trusted.',
  }),
  'low-supply': (evidence) => ({
    subject: 'the supply voltage is low',
    finding: `The pump’s supply reads ${voltText(evidence.supplyV)}; the figure set for this boat is ${voltText(evidence.lowSupplyV)}.`,
    sureness: 'Read while the pump was off.',
    steps: ['Check charging and the battery before the pump drains it further.', BREAKER],
    text: `supply at the pump is ${voltText(evidence.supplyV)}, low. Check charging. OK or OFF?`,
  }),
  freeze: (evidence, units) => ({
    subject: 'it is close to freezing by the pump',
    finding: `By the pump it is ${formatTemperature(evidence.airC, units.temperature)}. Water left in hoses, bowls and pump can freeze and break them.`,
    sureness: null,
    steps: [
      'Warm the space, or drain and winterise the system as its maker says.',
      'If it is laid up, say so: LAIDUP.',
    ],
    text: `${formatTemperature(evidence.airC, units.temperature)} by the pump, it may freeze. Warm the space or winterise. LAIDUP?`,
  }),
}

/** The end of each kind, after the boat's name. */
export const ENDED: Record<NoticeKind, string> = {
  'night-warning': 'the night is over',
  'short-hold': 'the pump rests long enough again',
  'short-cycling': 'the pump has stopped starting every few minutes',
  'running-on': 'the pump has stopped',
  'no-start': 'the pump has started again',
  'slow-recharge': 'the pump is as quick as usual again',
  'switch-drift': 'the vacuum switch is where it was',
  step: 'the leak is back where it was before the step',
  'logger-silent': 'the logger is heard again',
  'sensor-fault': 'the vacuum sensor reads as it should again',
  'low-supply': 'the supply voltage is back',
  freeze: 'it is warmer by the pump again',
}

const rechargeText = (paPerSecond: number | null | undefined, units: Units): string =>
  paPerSecond == null
    ? 'an unknown amount'
    : `${fromPa(paPerSecond, units.vacuum).toFixed(units.vacuum === 'mbar' ? 1 : 2)} ${units.vacuum} a second`
const voltText = (volts: number | null | undefined): string =>
  volts == null ? 'unknown' : `${volts.toFixed(1)} V`
const between = (evidence: RecordEvidence): string =>
  evidence.sinceLocal && evidence.untilLocal
    ? ` between ${evidence.sinceLocal} and ${evidence.untilLocal}`
    : ''
