import { nextNormal, type RandomState } from '@/simulator/random'
import { MS_PER_DAY, MS_PER_SECOND, PA_PER_INHG } from '@/simulator/physics/constants'
import { inSpans, type Span } from '@/simulator/physics/leaks'

export type Channel = 'pump' | 'vacuum' | 'air' | 'barometer' | 'supply'

export type LoggerSpec = {
  channels: readonly Channel[]
  intervalSeconds: number
  /** Air, barometer and supply only in samples this far apart (0 = in each). */
  slowChannelSeconds: number
  /** Standard deviation of a single reading, per channel. */
  noise: { vacuumPa: number; airC: number; barometerPa: number; supplyV: number }
  /** Step of the reading, 0 for none. A coarse gauge has 0.1 inHg. */
  resolution: { vacuumPa: number; airC: number; barometerPa: number; supplyV: number }
  /** What the vacuum sensor adds. */
  vacuumOffsetPa: number
  /** The clock is ahead by `offsetSeconds` at `driftFrom` and gains `driftPpm` from then on. */
  clock: { offsetSeconds: number; driftPpm: number; driftFrom: number }
  /** Nothing is recorded. */
  silent: readonly Span[]
  /** Recorded, but sent only when the span is over. */
  late: readonly Span[]
  /** The vacuum reading stays at what it was. */
  stuck: readonly Span[]
}

export const LOGGER_RESOLUTION_PA = 0.01 * PA_PER_INHG
export const DIGITAL_GAUGE_RESOLUTION_PA = 0.1 * PA_PER_INHG

/** One timestamp of one logger. `at` is epoch ms by the logger's own clock; null = not measured. */
export interface SimSample {
  at: number
  vacuumPa: number | null
  pumpOn: boolean | null
  airC: number | null
  barometerPa: number | null
  supplyV: number | null
}

/** True time ↔ what the logger's clock says, both epoch ms. */
export function loggerClock({ clock }: LoggerSpec) {
  const rate = clock.driftPpm * 1e-6
  const offsetMs = clock.offsetSeconds * MS_PER_SECOND
  return {
    says: (trueMs: number): number => trueMs + offsetMs + rate * (trueMs - clock.driftFrom),
    trueAt: (saidMs: number): number => (saidMs - offsetMs + rate * clock.driftFrom) / (1 + rate),
  }
}

/** True time from which a sample taken at `trueMs` can be sent. */
export const sendableAt = (logger: LoggerSpec, trueMs: number): number =>
  logger.late.find((span) => trueMs >= span.from && trueMs < span.to)?.to ?? trueMs

const toStep = (value: number, step: number): number => (step > 0 ? Math.round(value / step) * step : value)
const decimals = (value: number, factor: number): number => Math.round(value * factor) / factor

export type Reading = {
  vacuumPa: number
  pumpOn: boolean
  airC: number
  barometerPa: number
  supplyV: number
}

/**
 * What the logger makes of the true values. Takes the same number of random draws whatever its channels, so
 * that leaving one out changes nothing in the others. Rounded as the wire carries it: 0.1 Pa, 0.01 °C, 0.01 V.
 */
export function takeReading(
  logger: LoggerSpec,
  random: RandomState,
  saidMs: number,
  truth: Reading,
  options: { stuckVacuumPa: number | null; withSlowChannels: boolean },
): SimSample {
  const { noise, resolution } = logger
  const measure = (value: number, deviation: number, step: number): number =>
    toStep(value + deviation * nextNormal(random), step)
  const vacuum = measure(truth.vacuumPa + logger.vacuumOffsetPa, noise.vacuumPa, resolution.vacuumPa)
  const air = measure(truth.airC, noise.airC, resolution.airC)
  const barometer = measure(truth.barometerPa, noise.barometerPa, resolution.barometerPa)
  const supply = measure(truth.supplyV, noise.supplyV, resolution.supplyV)
  const has = (channel: Channel): boolean =>
    logger.channels.includes(channel) &&
    (options.withSlowChannels || channel === 'pump' || channel === 'vacuum')
  return {
    at: saidMs,
    vacuumPa: has('vacuum') ? (options.stuckVacuumPa ?? decimals(vacuum, 10)) : null,
    pumpOn: has('pump') ? truth.pumpOn : null,
    airC: has('air') ? decimals(air, 100) : null,
    barometerPa: has('barometer') ? decimals(barometer, 10) : null,
    supplyV: has('supply') ? Math.max(0, decimals(supply, 100)) : null,
  }
}

export const isRecording = (logger: LoggerSpec, trueMs: number): boolean => !inSpans(logger.silent, trueMs)

/** A clock that gains or loses so many seconds a day, from right at `from`. */
export const driftingClock = (secondsPerDay: number, from: number): LoggerSpec['clock'] => ({
  offsetSeconds: 0,
  driftPpm: (secondsPerDay * MS_PER_SECOND * 1e6) / MS_PER_DAY,
  driftFrom: from,
})
