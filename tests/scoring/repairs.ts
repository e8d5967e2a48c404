import type { ComparedHold, ComparedPeriod, ComparedRun } from '@/lib/analysis/comparison'
import { normalDraw, type Random } from '@/lib/analysis/statistics'
import { inHgToPa } from '@/shared/units'

const HOUR_MS = 3_600_000

export type RepairStory = 'full' | 'partial' | 'none' | 'worse' | 'pumped-out'
export type PeriodSpec = {
  holdHours: number
  /** Gas space against the usual: rate and recharge go with its inverse. */
  volume: number
  days: number
  from: number
  flushesAnHour: number
  swing: number
}

const DIFFERENTIAL_PA = inHgToPa(2)
const PUMP_PA_PER_SECOND = inHgToPa(0.05)

/** A period of a boat: holds that leaks end and flushes cut, rates that follow warmth and weather. */
export function drawPeriod(random: Random, spec: PeriodSpec): ComparedPeriod {
  const holds: ComparedHold[] = []
  const runs: ComparedRun[] = []
  const to = spec.from + spec.days * 24 * HOUR_MS
  let weather = 0.05 * normalDraw(random)
  let at = spec.from
  while (at < to) {
    weather = 0.9 * weather + 0.02 * normalDraw(random)
    const hourOfDay = (at / HOUR_MS) % 24
    const warmth = Math.exp(spec.swing * Math.sin((2 * Math.PI * hourOfDay) / 24) + weather)
    const paPerHour = (DIFFERENTIAL_PA / (spec.holdHours * spec.volume)) * warmth
    const whole = (DIFFERENTIAL_PA / paPerHour) * HOUR_MS
    const cut = timeToFlush(random, hourOfDay, spec.flushesAnHour)
    const endedAt = Math.min(at + Math.min(whole, cut), to)
    const ending = endedAt === to ? 'open' : cut < whole ? 'flush' : 'leak'
    holds.push({
      startedAt: at,
      endedAt,
      ending,
      leakRate: readRate(random, paPerHour, (endedAt - at) / HOUR_MS),
    })
    const recharge = (PUMP_PA_PER_SECOND / spec.volume) * Math.exp(0.04 * normalDraw(random))
    const runMs = (DIFFERENTIAL_PA / recharge) * 1000
    if (ending !== 'open')
      runs.push({ startedAt: endedAt, stoppedAt: endedAt + runMs, rechargePaPerSecond: recharge })
    at = endedAt + runMs
  }
  return { from: spec.from, to, holds, runs, differentialPa: DIFFERENTIAL_PA }
}

/** People flush while they are up; the first after waking ends what the night left. */
function timeToFlush(random: Random, hourOfDay: number, flushesAnHour: number): number {
  const asleepHours = hourOfDay >= 23 ? 31 - hourOfDay : hourOfDay < 7 ? 7 - hourOfDay : 0
  const awakeHours = -Math.log(1 - random()) / flushesAnHour
  return (asleepHours + awakeHours) * HOUR_MS
}

function readRate(random: Random, paPerHour: number, hours: number): ComparedHold['leakRate'] {
  if (hours < 0.1) return null
  const sigma = inHgToPa(0.015) / hours + 0.015 * paPerHour
  const read = paPerHour + sigma * normalDraw(random)
  return { paPerHour: read, low: read - 2 * sigma, high: read + 2 * sigma }
}
