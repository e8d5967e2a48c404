import { DEFAULT_UNITS, type UnitChoice } from '@/shared/units'

/** Cookies that carry what a reader chose, so that the server draws the first frame as they want it. */
export const THEME_COOKIE = 'mw-theme'
export const UNITS_COOKIE = 'mw-units'

export type Theme = 'system' | 'day' | 'night'
const YEAR_SECONDS = 31_536_000

/** Anything but a chosen day or night follows the system. */
export const parseTheme = (text: string | undefined): Theme =>
  text === 'day' || text === 'night' ? text : 'system'

const VACUUM = ['inHg', 'kPa', 'mbar'] as const
const VOLUME = ['L', 'usGal', 'impGal'] as const

/** `parseUnits('kPa.F.usGal')`; what is not understood falls back part by part. */
export function parseUnits(text: string | undefined): UnitChoice {
  const [vacuum, temperature, volume] = (text ?? '').split('.')
  return {
    vacuum: VACUUM.find((unit) => unit === vacuum) ?? DEFAULT_UNITS.vacuum,
    temperature: temperature === 'F' ? 'F' : DEFAULT_UNITS.temperature,
    volume: VOLUME.find((unit) => unit === volume) ?? DEFAULT_UNITS.volume,
  }
}
export const unitsText = (units: UnitChoice): string => `${units.vacuum}.${units.temperature}.${units.volume}`

/** Keeps a preference in this browser for a year. */
export function keepPreference(name: string, value: string): void {
  document.cookie = `${name}=${value}; path=/; max-age=${YEAR_SECONDS}; samesite=lax`
}
