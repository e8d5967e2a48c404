import { numberOf } from '@/components/calculators/readings'
import { toPa, type VacuumUnit } from '@/shared/units'

/** What each kind of hand gauge can be read to, Pa; the page hands it over. */
export type GaugeResolutions = Record<'dial' | 'digital', number>
export type Gauge = keyof GaugeResolutions

/** A gauge reading as typed, in Pa; null when it is no number. `gaugePa('10,0', 'inHg') // 33863.9` */
export function gaugePa(text: string, unit: VacuumUnit): number | null {
  const value = numberOf(text)
  return value === null ? null : toPa(value, unit)
}
