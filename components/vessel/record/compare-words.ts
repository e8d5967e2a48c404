import type { Comparison, ComparisonSide, RepairVerdict } from '@/shared/schemas'
import { formatDuration, formatRate, UNKNOWN, vacuumFigure, type VacuumUnit } from '@/shared/units'

/** Of a visit it is a repair that is judged; of any two spans only what changed. */
const OF_VISIT: Record<RepairVerdict, string> = {
  held: 'The repair held',
  'better-under-limit': 'Better, but still under the limit',
  'no-change': 'No change',
  worse: 'Worse',
  'too-early': 'Too early to say',
}
const OF_SPANS: Record<RepairVerdict, string> = { ...OF_VISIT, held: 'Better, and over the limit' }

const BECAUSE: Record<NonNullable<Comparison['because']>, string> = {
  'gas-space':
    'Leak and recharge moved together with K the same: the gas space changed (a tank that filled or was pumped out), not the leak.',
  switch: 'The switch’s differential moved with the leak the same: a matter of the switch.',
}

const factor = (value: number): string => Number(value.toPrecision(2)).toString()

const chanceWords = (pValue: number | null): string[] =>
  pValue === null ? [] : [pValue < 0.001 ? 'p under 0.001' : `p ${Number(pValue.toPrecision(2))}`]

/** How long it holds after against before: "holds 3.2 times as long as before (2.8 to 3.7, p under 0.001)". */
function ratioWords({ value, low, high }: NonNullable<Comparison['ratio']>, pValue: number | null): string {
  if (high === null && low !== null) {
    const [chance] = chanceWords(pValue)
    return `holds at least ${factor(low)} times as long as before${chance ? ` (${chance})` : ''}`
  }
  const interval =
    low === null
      ? high === null
        ? 'interval not known'
        : `up to ${factor(high)}`
      : `${factor(low)} to ${factor(high ?? value)}`
  return `holds ${factor(value)} times as long as before (${[interval, ...chanceWords(pValue)].join(', ')})`
}

/** The verdict in words, with the ratio of hold times and its interval, and what is still needed. */
export function compareFinding(comparison: Comparison, isVisit: boolean): string {
  const { verdict, ratio, pValue, hoursNeeded, because } = comparison
  const said = (isVisit ? OF_VISIT : OF_SPANS)[verdict]
  const needed = hoursNeeded === null ? '' : ` About ${Math.ceil(hoursNeeded)} more quiet hours are needed.`
  const reason = because === null ? '' : ` ${BECAUSE[because]}`
  return `${ratio === null ? said : `${said}: it ${ratioWords(ratio, pValue)}`}.${needed}${reason}`
}

export type CompareRow = { name: string; before: string; after: string }

/** What stands beside each other: hold time, then r, R, D and K, then what the pump did. */
export function compareRows({ before, after }: Comparison, unit: VacuumUnit): CompareRow[] {
  const row = (name: string, say: (side: ComparisonSide) => string): CompareRow => ({
    name,
    before: say(before),
    after: say(after),
  })
  const known = (value: number | null, say: (value: number) => string): string =>
    value === null ? UNKNOWN : say(value)
  return [
    row('Holds compared', (side) => String(side.holds)),
    row('Hold time', (side) => formatDuration(side.holdTimeSeconds)),
    row('Leak rate r', (side) => formatRate(side.leakRatePaPerHour, unit)),
    row('Recharge R', (side) =>
      known(side.rechargePaPerSecond, (value) => `${vacuumFigure(value, unit, 3)} ${unit}/s`),
    ),
    row('Differential D', (side) =>
      known(side.differentialPa, (value) => `${vacuumFigure(value, unit, 2)} ${unit}`),
    ),
    row('K, leak flow over pump flow', (side) =>
      known(side.flowRatio, (value) => `${(value * 100).toPrecision(2)} %`),
    ),
    row('Runs a day', (side) => known(side.runsPerDay, (value) => value.toFixed(value < 10 ? 1 : 0))),
    row('Pump on, a day', (side) => formatDuration(side.pumpSecondsPerDay)),
    row('Ah a day', (side) => known(side.ampHoursPerDay, (value) => value.toFixed(1))),
  ]
}
