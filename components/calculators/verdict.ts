import type { Readings } from '@/components/calculators/readings'
import { durationAndInterval } from '@/components/figures'
import type { SystemState } from '@/components/states'
import type { Phrase } from '@/components/tonight/phrases'
import type { LeakDownVerdict } from '@/shared/schemas'
import {
  formatDuration,
  formatLeakFlow,
  formatRate,
  formatRateRange,
  fromPa,
  type UnitChoice,
} from '@/shared/units'

/** What the arithmetic answers; the page hands the function that works it out. */
export type LeakDownAnswer = {
  paPerHour: number
  compensatedPaPerHour: number | null
  low: number
  high: number
  holdSeconds: number | null
  verdict: LeakDownVerdict
  moreMinutes: number | null
  flowPaM3PerS: number | null
  holeDiameterM: number | null
  airMoved: boolean
}
export type Judge = (readings: Readings) => LeakDownAnswer

export const LIMIT_SECONDS = 10_800

/** The mark of a verdict; one that cannot be told yet is still being learned. */
export const verdictState = (verdict: LeakDownVerdict): SystemState =>
  verdict === 'cannot-tell' ? 'learning' : verdict

const WORDS: Record<LeakDownVerdict, string> = {
  tight: 'Tight.',
  weeping: 'Weeping.',
  leaking: 'Leaking.',
  'short-cycling': 'Leaking badly.',
  'cannot-tell': 'Cannot tell yet',
}

const held = (differentialPa: number, paPerHour: number): number | null =>
  paPerHour > 0 ? (differentialPa / paPerHour) * 3600 : null

/** The verdict as a sentence with its hold time and interval. */
export function verdictSentence(answer: LeakDownAnswer, { differentialPa }: Readings): Phrase[] {
  const least = held(differentialPa, answer.high)
  const most = held(differentialPa, answer.low)
  if (answer.verdict === 'cannot-tell') {
    const more = answer.moreMinutes
    return [
      { text: WORDS[answer.verdict] },
      { text: more === null ? '.' : ': ' },
      ...(more === null
        ? []
        : [{ text: `${Math.ceil(more)} more minutes`, strong: 'ink' as const }, { text: ' decide it.' }]),
      { text: least === null ? '' : ` So far: at least ${formatDuration(least)}.` },
    ]
  }
  if (answer.holdSeconds === null || most === null) {
    return [
      { text: `${WORDS[answer.verdict]} It would hold ` },
      {
        text: least === null ? 'as long as anyone waits' : `at least ${formatDuration(least)}`,
        strong: 'ink',
      },
      { text: '.' },
    ]
  }
  const [value, interval] = durationAndInterval(answer.holdSeconds, least, most)
  return [
    { text: `${WORDS[answer.verdict]} It would hold about ` },
    { text: value, strong: 'ink' },
    { text: ` (${interval})` },
    { text: answer.holdSeconds < LIMIT_SECONDS ? `; the least is ${formatDuration(LIMIT_SECONDS)}.` : '.' },
  ]
}

/** A hole in words beside its figure: people know a hair better than a hundredth of a millimetre. */
function holeWords(metres: number): string {
  const millimetres = metres * 1000
  const figure = `${millimetres < 0.1 ? millimetres.toFixed(2) : millimetres.toFixed(1)} mm`
  const like = millimetres < 0.07 ? ', thinner than a hair' : millimetres < 0.6 ? ', about a pin’s point' : ''
  return `as through a sharp hole ${figure} wide${like}`
}

/** How the verdict came about: lost on the gauge, what weather hid or added, rate, leak flow and hole. */
export function verdictBasis(answer: LeakDownAnswer, readings: Readings, units: UnitChoice): string {
  const unit = units.vacuum
  const lost = readings.startPa - readings.endPa
  const figure = (pa: number) => `${Math.abs(fromPa(pa, unit)).toFixed(unit === 'mbar' ? 1 : 2)} ${unit}`
  const parts = [
    lost >= 0
      ? `Lost ${figure(lost)} on the gauge.`
      : `Gained ${figure(lost)} on the gauge: that is weather or temperature, not a repair.`,
  ]
  const rate = answer.compensatedPaPerHour ?? answer.paPerHour
  if (answer.compensatedPaPerHour !== null) {
    const hidden = ((answer.compensatedPaPerHour - answer.paPerHour) * readings.seconds) / 3600
    parts.push(`Weather and temperature ${hidden >= 0 ? 'hid' : 'added'} ${figure(hidden)}.`)
  } else parts.push('Not corrected for weather or temperature.')
  parts.push(`${formatRate(rate, unit)} (${formatRateRange(answer.low, answer.high, unit)}).`)
  if (answer.flowPaM3PerS !== null && answer.flowPaM3PerS > 0) {
    const hole = answer.holeDiameterM === null ? '' : `, ${holeWords(answer.holeDiameterM)}`
    parts.push(`That is ${formatLeakFlow(answer.flowPaM3PerS)}${hole}.`)
  }
  if (answer.airMoved)
    parts.push(
      'The air moved by more than 2 °C: liquid and walls lag behind it, so take this with care, or test again at an even temperature.',
    )
  return parts.join(' ')
}
