import { EVENINGS, TWO_ABOARD } from '@/simulator/habits'
import { DIGITAL_GAUGE_RESOLUTION_PA, LOGGER_RESOLUTION_PA, type Channel } from '@/simulator/logger'
import { PA_PER_INHG, STANDARD_PRESSURE_PA } from '@/simulator/physics/constants'
import type { LeakSpec } from '@/simulator/physics/leaks'
import { STEADY_WEATHER } from '@/simulator/physics/weather'
import { nextUniform, randomState } from '@/simulator/random'
import { CLEAN, defaultBoat, flowForBoatHold, type BoatSpec } from '@/simulator/spec'

export type RandomBoatKind = {
  logger: 'both' | 'vacuum-only' | 'pump-only'
  intervalSeconds: number
  /** A gauge that reads in tenths of an inch instead of hundredths. */
  coarse: boolean
  /** Air and barometer channels besides. */
  weatherChannels: boolean
  /** Pins the hold time; else 5 min to 40 h, log-uniform. */
  holdSeconds: number
  /** How far walls lag the air; 0 = not at all. Default: drawn, 20 to 90 min. */
  lagSeconds: number
  /** Share of saturated vapour. Default: drawn, 0 to 1. */
  wetness: number
  /** Steady 20 °C, one atmosphere, dry, no settling: the leak alone. */
  steady: boolean
  /** Seals that dry and valves that seat differently each time. Default off: one leak law for the whole stretch. */
  changing: boolean
  flushesPerDay: number
  offsetSeconds: number
}

/**
 * A plausible boat drawn from a seed, for scoring: 10 to 80 L, hold times from 5 min to 40 h, one to three
 * leaks of either law, a pump that recharges in 20 to 120 s, 4 to 24 flushes a day.
 * @example simulateBoat(randomBoat(17, { logger: 'pump-only' }), from, to)
 */
export function randomBoat(seed: number, kind: Partial<RandomBoatKind> = {}): BoatSpec {
  const random = randomState(seed, 99)
  const between = (low: number, high: number): number => low + (high - low) * nextUniform(random)
  const logBetween = (low: number, high: number): number => low * (high / low) ** nextUniform(random)

  const volumeM3 = logBetween(0.01, 0.08)
  const cutOutPa = between(9.5, 10.8) * PA_PER_INHG
  const cutInPa = cutOutPa - between(1.6, 2.4) * PA_PER_INHG
  const points = { cutOutPa, cutInPa, scatterPa: between(0.005, 0.03) * PA_PER_INHG, drift: [] }
  const drawnHold = logBetween(300, 40 * 3600)
  const holdSeconds = kind.holdSeconds ?? drawnHold
  const rechargeSeconds = Math.min(logBetween(20, 120), holdSeconds / 3)
  const meanSpeed =
    (volumeM3 * Math.log((STANDARD_PRESSURE_PA - cutInPa) / (STANDARD_PRESSURE_PA - cutOutPa))) /
    rechargeSeconds
  const dropPa = between(1.2, 4.5) * PA_PER_INHG
  const airLitres = (1000 * dropPa * volumeM3) / STANDARD_PRESSURE_PA
  const habit = nextUniform(random) < 0.5 ? TWO_ABOARD : EVENINGS
  const drawnFlushes = between(4, 24)
  const perDay = habit.reduce((sum, each) => sum + each, 0)
  const scale = (kind.flushesPerDay ?? drawnFlushes) / perDay
  const drawnLag = between(1200, 5400)
  const drawnWetness = nextUniform(random)
  const steady = kind.steady ?? false

  const leakCount = 1 + Math.floor(3 * nextUniform(random))
  const shares = Array.from({ length: leakCount }, () => between(0.2, 1))
  const whole = shares.reduce((sum, share) => sum + share, 0)
  const parts = ['head-1', 'head-2', 'hose-1', 'tank', 'pump']
  const leaks = shares.map((share): LeakSpec => {
    const leakKind = nextUniform(random) < 0.5 ? 'orifice' : 'laminar'
    const part = parts[Math.floor(nextUniform(random) * parts.length)] ?? 'tank'
    const flow = (share / whole) * flowForBoatHold({ volumeM3, switch: points }, leakKind, holdSeconds)
    return { part, kind: leakKind, flowPaM3PerS: flow, ...(kind.changing ? changes(part, between) : {}) }
  })

  return defaultBoat({
    seed,
    name: `Boat ${seed}`,
    offsetSeconds: kind.offsetSeconds ?? 0,
    volumeM3,
    initialVacuumPa: between(cutInPa / PA_PER_INHG + 0.1, cutOutPa / PA_PER_INHG) * PA_PER_INHG,
    leaks,
    pump: { displacementM3PerS: meanSpeed / (1 - 9 / 22) },
    switch: points,
    gas: steady
      ? CLEAN.gas
      : {
          lagSeconds: kind.lagSeconds ?? drawnLag,
          coupling: between(0.5, 0.9),
          wetness: kind.wetness ?? drawnWetness,
          heatShare: between(0.25, 0.6),
          settleSeconds: between(30, 80),
        },
    weather: steady
      ? STEADY_WEATHER
      : {
          meanC: between(8, 27),
          dailyC: between(1, 5),
          wanderC: between(0.5, 2),
          synopticPa: between(300, 900),
        },
    habits: {
      heads: [
        { key: 'head-1', weight: 2, airLitres, waterLitres: 0.6 },
        { key: 'head-2', weight: 1, airLitres: airLitres * between(0.8, 1.2), waterLitres: 0.6 },
      ],
      flushesByHour: habit.map((each) => each * scale),
      tapsPerDay: between(0, 2.5),
    },
    logger: {
      channels: channelsOf(kind.logger ?? 'both', kind.weatherChannels ?? true),
      intervalSeconds: kind.intervalSeconds ?? 15,
      noise: { vacuumPa: between(3, 20), airC: 0.03, barometerPa: 5, supplyV: 0.02 },
      resolution: {
        vacuumPa: kind.coarse ? DIGITAL_GAUGE_RESOLUTION_PA : LOGGER_RESOLUTION_PA,
        airC: 0.1,
        barometerPa: 10,
        supplyV: 0.01,
      },
    },
  })
}

function channelsOf(logger: RandomBoatKind['logger'], weather: boolean): Channel[] {
  const channels: Channel[] =
    logger === 'both' ? ['pump', 'vacuum'] : logger === 'pump-only' ? ['pump'] : ['vacuum']
  return weather && logger !== 'pump-only' ? [...channels, 'air', 'barometer'] : channels
}

function changes(part: string, between: (low: number, high: number) => number): Partial<LeakSpec> {
  if (part === 'pump') return { reseatsAtRun: between(0.1, 0.5) }
  if (!part.startsWith('head')) return {}
  return between(0, 1) < 0.5
    ? { reseatsAtFlush: between(0.1, 0.5) }
    : { wetting: { wetShare: 1 / 30, wetSeconds: between(300, 3600), dryingSeconds: between(600, 7200) } }
}
