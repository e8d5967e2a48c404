import { meanOfDays, type PumpDay } from '@/components/vessel/pump/pump-days'
import type { Summary } from '@/shared/schemas'
import { formatDuration, formatShare, vacuumFigure, type VacuumUnit } from '@/shared/units'

const WEEK = 7

/** The pump in a sentence: its recharge against its usual, and what it ran and took a day in the last week. */
export function pumpFinding(summary: Summary | null, days: readonly PumpDay[], unit: VacuumUnit): string {
  const parts: string[] = []
  const recharge = summary?.recharge ?? null
  if (recharge !== null) {
    const now = `${vacuumFigure(recharge.paPerSecond, unit, 3)} ${unit}/s`
    const usual = recharge.usualPaPerSecond
    const ratio = usual === null || usual <= 0 ? null : recharge.paPerSecond / usual
    if (ratio === null) parts.push(`It draws down at ${now}.`)
    else if (ratio < 0.9) parts.push(`It draws down at ${now}, ${formatShare(1 - ratio)} slower than usual.`)
    else if (ratio > 1.1) parts.push(`It draws down at ${now}, ${formatShare(ratio - 1)} faster than usual.`)
    else parts.push(`It draws down at ${now}, as usual.`)
  }
  const mean = meanOfDays(days, WEEK)
  if (mean !== null) {
    const ampHours = mean.ampHours === null ? '' : `, ${mean.ampHours.toFixed(1)} Ah`
    parts.push(
      `In the last week it ran ${mean.runs.toFixed(mean.runs < 10 ? 1 : 0)} times a day for ${formatDuration(mean.seconds)} in all${ampHours}.`,
    )
  }
  return parts.join(' ')
}
