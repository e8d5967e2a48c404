import { median } from 'simple-statistics'
import {
  absent,
  HOLDS_NEEDED,
  isFresh,
  MARGIN,
  unclear,
  type Finding,
  type JudgedRecord,
} from '@/lib/notices/record'

const SLOWER_BY = 1.5
const RUNS_NEEDED = 5
const FRESH_HOURS = 48

/** Five runs in a row that took half as long again as usual over the same band. */
export function slowRecharge(record: JudgedRecord): Finding {
  const usual = record.figures.signs.usual.rechargePaPerSecond
  const rates = record.runs
    .map((run) => run.rechargePaPerSecond)
    .filter((rate) => rate !== null)
    .filter((rate) => rate > 0)
  const lastFive = rates.slice(-RUNS_NEEDED)
  if (usual === null || usual <= 0 || lastFive.length < RUNS_NEEDED) return unclear
  if (isFresh(record, FRESH_HOURS) && lastFive.every((rate) => usual / rate >= SLOWER_BY)) {
    const now = median(lastFive)
    return {
      is: 'present',
      severity: usual / now,
      reason: `The pump takes ${(usual / now).toFixed(1)} times as long as usual`,
      evidence: { rechargePaPerSecond: now, usualRechargePaPerSecond: usual },
    }
  }
  const isOver = rates.slice(-HOLDS_NEEDED).every((rate) => usual / rate <= SLOWER_BY / MARGIN)
  return isOver ? absent : unclear
}
