import type { FlushRow, HoldRow, LegBins, LegRow, RunRow } from '@/lib/analysis/fold'
import { ratePaPerHourAt, type LeakLawFit } from '@/lib/analysis/fit'

export const INHG = 3386.388640341
export const HOUR_MS = 3_600_000
export const DAY_MS = 24 * HOUR_MS
export const AT = Date.UTC(2027, 2, 15, 12)

export function hold(startedAt: number, seconds: number, over: Partial<HoldRow> = {}): HoldRow {
  const endedAt = startedAt + seconds * 1000
  return {
    startedAt,
    endedAt,
    ending: 'leak',
    flushes: 0,
    cutOutPa: 10 * INHG,
    settledPa: 10 * INHG,
    endPa: 8 * INHG,
    learnedCutOutPa: 10 * INHG,
    learnedSettledPa: 10 * INHG,
    learnedCutInPa: 8 * INHG,
    setAside: false,
    edgeUncertaintySeconds: 0.5,
    knownAt: endedAt,
    ...over,
  }
}

export function run(startedAt: number, seconds: number, over: Partial<RunRow> = {}): RunRow {
  const stoppedAt = startedAt + seconds * 1000
  return {
    startedAt,
    stoppedAt,
    trigger: 'leak',
    vacuumAtStartPa: 8 * INHG,
    vacuumAtStopPa: 10 * INHG,
    rechargePaPerSecond: (2 * INHG) / seconds,
    supplyV: 12.6,
    edgeUncertaintySeconds: 0.5,
    interrupted: false,
    knownAt: stoppedAt,
    ...over,
  }
}

export const flush = (at: number, dropPa = 3 * INHG, startedPump = true): FlushRow => ({
  at,
  dropPa,
  startedPump,
  knownAt: at,
})

/** A leg of the exact law, read every `stepSeconds` to the nearest `gaugePa` (0 = exactly), at steady 20 °C. */
export function leg(
  startedAt: number,
  seconds: number,
  law: LeakLawFit,
  over: Partial<LegRow> & { fromPa?: number; stepSeconds?: number; gaugePa?: number } = {},
): LegRow {
  const { fromPa = 10 * INHG, stepSeconds = 60, gaugePa = 0, ...rest } = over
  const bins: LegBins = {
    widthSeconds: stepSeconds,
    offsetSeconds: [],
    count: [],
    vacuumPa: [],
    airC: [],
    laggedAirC: [[], []],
    barometerPa: [],
  }
  let vacuumPa = fromPa
  for (let offset = 0; offset <= seconds; offset += 15) {
    if (offset % stepSeconds === 0) {
      bins.offsetSeconds.push(offset)
      bins.count.push(1)
      bins.vacuumPa.push(gaugePa > 0 ? Math.round(vacuumPa / gaugePa) * gaugePa : vacuumPa)
      bins.airC.push(20)
      bins.laggedAirC[0].push(20)
      bins.laggedAirC[1].push(20)
      bins.barometerPa.push(101_325)
    }
    vacuumPa -= (ratePaPerHourAt(law, vacuumPa) * 15) / 3600
  }
  const paPerHour = ratePaPerHourAt(law, fromPa)
  const endedAt = startedAt + seconds * 1000
  return {
    holdStartedAt: startedAt - 90_000,
    startedAt,
    endedAt,
    sinceFlushSeconds: null,
    bins,
    rate: { paPerHour, low: 0.97 * paPerHour, high: 1.03 * paPerHour, compensated: true },
    setAside: false,
    knownAt: endedAt,
    ...rest,
  }
}

export const lawOf = (paPerHour: number, orificeShare = 0.5): LeakLawFit => ({
  orificePaPerHour: paPerHour * orificeShare,
  laminarPaPerHour: paPerHour * (1 - orificeShare),
  midPa: 9 * INHG,
  standardPressurePa: 101_325,
})
