import type { CheckFigure } from '@/shared/schemas'
import {
  formatDuration,
  formatRate,
  formatRateRange,
  formatVacuum,
  UNKNOWN,
  type VacuumUnit,
} from '@/shared/units'

const VACUUM_DECIMALS: Record<VacuumUnit, number> = { inHg: 2, kPa: 2, mbar: 1 }

/** A check's figure in the reader's unit, with its interval where it has one. */
export function figureWords(figure: CheckFigure, unit: VacuumUnit): string {
  const { value } = figure
  if (value === null) return UNKNOWN
  switch (figure.unit) {
    case 'Pa':
      return formatVacuum(value, unit, VACUUM_DECIMALS[unit])
    case 'Pa/h':
      return figure.low == null || figure.high == null
        ? formatRate(value, unit)
        : `${formatRate(value, unit)} (${formatRateRange(figure.low, figure.high, unit)})`
    case 's':
      return formatDuration(value)
    case 'ratio':
      return value.toFixed(4)
    case 'V':
      return `${value.toFixed(1)} V`
    case 'count':
      return String(value)
  }
}
