/**
 * The one place that converts. Everything is stored and computed in Pa, s, K or °C, and m³;
 * a reader's unit exists only at the edge. Factors: NIST SP 811 (2008), appendix B.8, computed exactly
 * from its definitions (inch 0.0254 m, pound 0.45359237 kg, g_n 9.80665 m/s², mercury 13595.1 kg/m³).
 */

/** Pa in one of each unit. The inch of mercury is the conventional one (0 °C), not the 60 °F one (3376.85 Pa). */
export const PA_PER = {
  Pa: 1,
  kPa: 1000,
  hPa: 100,
  mbar: 100,
  bar: 100_000,
  atm: 101_325,
  inHg: 3386.388640341,
  mmHg: 133.322387415,
  torr: 101_325 / 760,
  psi: 6894.757293168361,
  inH2O: 249.08891,
} as const
export type PressureUnit = keyof typeof PA_PER

export const PA_PER_INHG = PA_PER.inHg
export const STANDARD_PRESSURE_PA = 101_325
export const ZERO_CELSIUS_K = 273.15
export const SECONDS_PER_HOUR = 3600

/** m³ in one of each unit. */
export const M3_PER = {
  m3: 1,
  L: 0.001,
  mL: 1e-6,
  usGal: 0.003785411784,
  impGal: 0.00454609,
  ft3: 0.028316846592,
} as const
export type VolumeUnit = keyof typeof M3_PER

/** m³/s in one of each unit of volume flow. */
export const M3_PER_SECOND_PER = {
  'm3/s': 1,
  'L/s': 0.001,
  'L/min': 0.001 / 60,
  'L/h': 0.001 / 3600,
  cfm: 0.028316846592 / 60,
} as const
export type VolumeFlowUnit = keyof typeof M3_PER_SECOND_PER

/**
 * Pa·m³/s in one of each unit of leak flow (a pV flow). `sccm` is of gas at 0 °C; with gas at another
 * temperature use `sccmToPaM3PerSecond`. `freeL/h` is litres of air at one standard atmosphere an hour.
 */
export const PA_M3_PER_SECOND_PER = {
  'Pa.m3/s': 1,
  'mbar.L/s': 0.1,
  'torr.L/s': (101_325 / 760) * 0.001,
  'atm.cm3/s': 0.101325,
  sccm: 0.101325 / 60,
  'freeL/h': 101.325 / 3600,
  'freeL/min': 101.325 / 60,
} as const
export type LeakFlowUnit = keyof typeof PA_M3_PER_SECOND_PER

export type TemperatureUnit = 'C' | 'F' | 'K'

/** What a reader may choose for vacuum, and the rest of their units. */
export type VacuumUnit = 'inHg' | 'kPa' | 'mbar'
export type UnitChoice = { vacuum: VacuumUnit; temperature: 'C' | 'F'; volume: 'L' | 'usGal' | 'impGal' }
export const DEFAULT_UNITS: UnitChoice = { vacuum: 'inHg', temperature: 'C', volume: 'L' }

/** Pressure to Pa. `toPa(10, 'inHg') // 33863.88640341` */
export const toPa = (value: number, unit: PressureUnit): number => value * PA_PER[unit]
/** Pa to another unit. `fromPa(101325, 'inHg') // 29.9212...` */
export const fromPa = (pa: number, unit: PressureUnit): number => pa / PA_PER[unit]
export const inHgToPa = (inHg: number): number => toPa(inHg, 'inHg')
export const paToInHg = (pa: number): number => fromPa(pa, 'inHg')

/** Volume to m³. `toM3(10, 'usGal') // 0.03785411784` */
export const toM3 = (value: number, unit: VolumeUnit): number => value * M3_PER[unit]
export const fromM3 = (m3: number, unit: VolumeUnit): number => m3 / M3_PER[unit]

/** Volume flow to m³/s. `toM3PerSecond(1, 'cfm') // 0.0004719474432` */
export const toM3PerSecond = (value: number, unit: VolumeFlowUnit): number => value * M3_PER_SECOND_PER[unit]
export const fromM3PerSecond = (flow: number, unit: VolumeFlowUnit): number => flow / M3_PER_SECOND_PER[unit]

/** Leak flow to Pa·m³/s. `toPaM3PerSecond(10, 'mbar.L/s') // 1` */
export const toPaM3PerSecond = (value: number, unit: LeakFlowUnit): number =>
  value * PA_M3_PER_SECOND_PER[unit]
export const fromPaM3PerSecond = (flow: number, unit: LeakFlowUnit): number =>
  flow / PA_M3_PER_SECOND_PER[unit]

/** pV flow of so many sccm (amount of gas, counted at 0 °C) when the gas is at `gasTempC`. 20 °C: 0.001812 Pa·m³/s each. */
export const sccmToPaM3PerSecond = (sccm: number, gasTempC = 0): number =>
  (sccm * PA_M3_PER_SECOND_PER.sccm * (gasTempC + ZERO_CELSIUS_K)) / ZERO_CELSIUS_K

/** Temperature to °C. SP 811 B.8. `toCelsius(68, 'F') // 20` */
export function toCelsius(value: number, unit: TemperatureUnit): number {
  if (unit === 'F') return (value - 32) / 1.8
  return unit === 'K' ? value - ZERO_CELSIUS_K : value
}
/** °C to another unit. `fromCelsius(20, 'F') // 68` */
export function fromCelsius(celsius: number, unit: TemperatureUnit): number {
  if (unit === 'F') return celsius * 1.8 + 32
  return unit === 'K' ? celsius + ZERO_CELSIUS_K : celsius
}
export const celsiusToKelvin = (celsius: number): number => celsius + ZERO_CELSIUS_K

/** Rate of pressure to Pa/h. `rateToPaPerHour(0.6, 'inHg') // 2031.8...` */
export const rateToPaPerHour = (perHour: number, unit: PressureUnit): number => toPa(perHour, unit)

// --- words and figures for a reader -------------------------------------------------------------

/** Shown where a figure is unknown: null, undefined or not finite. */
export const UNKNOWN = '–'
type Figure = number | null | undefined
const known = (value: Figure): value is number => typeof value === 'number' && Number.isFinite(value)

/** Fixed decimals with a true minus sign and no "−0". */
function fixed(value: number, decimals: number): string {
  const text = value.toFixed(decimals)
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', '−')
}

/** At least `digits` significant figures between 0 and `most` decimals: 0.0123 → "0.012", 12.3 → "12". */
function significant(value: number, digits: number, most: number): string {
  if (value === 0) return '0'
  const magnitude = Math.floor(Math.log10(Math.abs(value)))
  return fixed(value, Math.min(most, Math.max(0, digits - 1 - magnitude)))
}

const VACUUM_DECIMALS: Record<VacuumUnit, number> = { inHg: 1, kPa: 1, mbar: 0 }
const RATE_DECIMALS: Record<VacuumUnit, number> = { inHg: 2, kPa: 2, mbar: 1 }

/** The bare figure of a vacuum, for columns whose unit stands in the head. */
export function vacuumFigure(pa: Figure, unit: VacuumUnit, decimals = VACUUM_DECIMALS[unit]): string {
  return known(pa) ? fixed(fromPa(pa, unit), decimals) : UNKNOWN
}
/** `formatVacuum(33863.9, 'inHg') // "10.0 inHg"` */
export function formatVacuum(pa: Figure, unit: VacuumUnit, decimals?: number): string {
  return known(pa) ? `${vacuumFigure(pa, unit, decimals)} ${unit}` : UNKNOWN
}

export const rateUnitLabel = (unit: VacuumUnit): string => `${unit}/h`
/** The bare figure of a leak rate: two decimals, three under a hundredth. */
export function rateFigure(paPerHour: Figure, unit: VacuumUnit): string {
  if (!known(paPerHour)) return UNKNOWN
  const value = fromPa(paPerHour, unit)
  const tiny = value !== 0 && Math.abs(value) < 0.5 * 10 ** (1 - RATE_DECIMALS[unit])
  return fixed(value, RATE_DECIMALS[unit] + (tiny ? 1 : 0))
}
/** `formatRate(2031.83, 'inHg') // "0.60 inHg/h"`; positive loses vacuum. */
export function formatRate(paPerHour: Figure, unit: VacuumUnit): string {
  return known(paPerHour) ? `${rateFigure(paPerHour, unit)} ${rateUnitLabel(unit)}` : UNKNOWN
}
/** `formatRateRange(372.5, 1523.9, 'inHg') // "0.11 to 0.45 inHg/h"` */
export function formatRateRange(low: Figure, high: Figure, unit: VacuumUnit): string {
  return `${rateFigure(low, unit)} to ${rateFigure(high, unit)} ${rateUnitLabel(unit)}`
}

type DurationUnit = { seconds: number; name: string; from: number; digits: number }
const DURATION_UNITS: DurationUnit[] = [
  { seconds: 86_400, name: 'days', from: 71.95 * 3600, digits: 2 },
  { seconds: 3600, name: 'h', from: 59.5 * 60, digits: 2 },
  { seconds: 60, name: 'min', from: 89.5, digits: 1 },
  { seconds: 1, name: 's', from: 0, digits: 1 },
]
const durationUnit = (seconds: number): DurationUnit =>
  DURATION_UNITS.find((unit) => Math.abs(seconds) >= unit.from) ?? {
    seconds: 1,
    name: 's',
    from: 0,
    digits: 1,
  }
const durationFigure = (seconds: number, unit: DurationUnit): string =>
  significant(seconds / unit.seconds, unit.digits, 1).replace(/\.0$/, '')

/** A length of time in the unit people say it in: "45 s", "41 min", "2.2 h", "14 h", "5 days". */
export function formatDuration(seconds: Figure): string {
  if (!known(seconds)) return UNKNOWN
  const unit = durationUnit(seconds)
  return `${durationFigure(seconds, unit)} ${unit.name}`
}
/** Both ends in the unit of the longer: "2.1 to 2.4 h". Without an upper end: "at least 14 h". */
export function formatDurationRange(lowSeconds: Figure, highSeconds: Figure): string {
  if (!known(lowSeconds)) return UNKNOWN
  if (!known(highSeconds)) return `at least ${formatDuration(lowSeconds)}`
  const unit = durationUnit(highSeconds)
  return `${durationFigure(lowSeconds, unit)} to ${durationFigure(highSeconds, unit)} ${unit.name}`
}

/** `formatTemperature(20, 'F') // "68 °F"` */
export function formatTemperature(celsius: Figure, unit: 'C' | 'F', decimals = 0): string {
  return known(celsius) ? `${fixed(fromCelsius(celsius, unit), decimals)} °${unit}` : UNKNOWN
}

const VOLUME_LABELS = { L: 'L', usGal: 'US gal', impGal: 'imp gal' } as const
/** `formatVolume(0.04, 'L') // "40 L"` */
export function formatVolume(m3: Figure, unit: keyof typeof VOLUME_LABELS): string {
  return known(m3) ? `${significant(fromM3(m3, unit), 2, 2)} ${VOLUME_LABELS[unit]}` : UNKNOWN
}

const LEAK_FLOW_LABELS: Partial<Record<LeakFlowUnit, string>> = {
  'Pa.m3/s': 'Pa·m³/s',
  'mbar.L/s': 'mbar·L/s',
  sccm: 'sccm',
  'freeL/h': 'L of air an hour',
}
/** `formatLeakFlow(0.01, 'freeL/h') // "0.36 L of air an hour"` */
export function formatLeakFlow(paM3PerSecond: Figure, unit: LeakFlowUnit = 'freeL/h'): string {
  if (!known(paM3PerSecond)) return UNKNOWN
  return `${significant(fromPaM3PerSecond(paM3PerSecond, unit), 2, 6)} ${LEAK_FLOW_LABELS[unit] ?? unit}`
}

/** Barometer as the boat's weather report gives it. `formatBarometer(101325) // "1013 hPa"` */
export const formatBarometer = (pa: Figure): string => (known(pa) ? `${fixed(pa / 100, 0)} hPa` : UNKNOWN)
/** `formatShare(0.634) // "63 %"` */
export const formatShare = (share: Figure): string => (known(share) ? `${fixed(share * 100, 0)} %` : UNKNOWN)
