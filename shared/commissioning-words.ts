import type { CheckFigure, CheckKind, CheckOutcome } from './schemas/commissioning'
import { formatDuration, formatRate, formatRateRange, formatVacuum, UNKNOWN, type VacuumUnit } from './units'

/** The checks of a commissioning by name, alike on screen and on paper. */
export const CHECK_TITLES: Record<CheckKind, string> = {
  'first-reading': 'First reading',
  'leak-down-before': 'Leak-down before fitting',
  zero: 'Zero check',
  'two-point': 'Two-point check',
  'pump-channel': 'Pump channel',
  'breaker-off': 'Breaker off',
  'leak-down-after': 'Leak-down after fitting',
}

export const OUTCOME_TITLES: Record<CheckOutcome, string> = {
  passed: 'Passed',
  failed: 'Did not pass',
  'cannot-tell': 'Cannot tell yet',
  'left-out': 'Left out',
}

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
