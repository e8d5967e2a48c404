import type { Run } from '@/shared/schemas'
import { formatShare } from '@/shared/units'

const STEP_V = 0.5
/** So many runs make a middle worth comparing. */
const FEWEST = 3

/** Runs by themselves at one supply voltage, [lowV, highV); medians. */
export interface SupplyBin {
  lowV: number
  highV: number
  runs: number
  rechargePaPerSecond: number
  seconds: number
}

function middleOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const half = sorted.length / 2
  const [low, high] = [sorted[Math.ceil(half) - 1] ?? NaN, sorted[Math.floor(half)] ?? NaN]
  return (low + high) / 2
}

/**
 * Recharge by supply voltage, lowest first, in steps of half a volt: a pump slows with its supply, and that is no
 * fault of the pump. Only runs by themselves, all of which refill one differential; without a supply channel: none.
 */
export function supplyBins(runs: readonly Run[]): SupplyBin[] {
  const bins = new Map<number, { recharge: number[]; seconds: number[] }>()
  for (const { trigger, supplyV, rechargePaPerSecond, durationSeconds, stoppedAt } of runs) {
    if (trigger !== 'leak' || stoppedAt === null || supplyV == null || rechargePaPerSecond == null) continue
    const step = Math.floor(supplyV / STEP_V)
    const bin = bins.get(step) ?? { recharge: [], seconds: [] }
    bin.recharge.push(rechargePaPerSecond)
    bin.seconds.push(durationSeconds)
    bins.set(step, bin)
  }
  return [...bins]
    .sort(([a], [b]) => a - b)
    .map(([step, { recharge, seconds }]) => ({
      lowV: step * STEP_V,
      highV: (step + 1) * STEP_V,
      runs: recharge.length,
      rechargePaPerSecond: middleOf(recharge),
      seconds: middleOf(seconds),
    }))
}

/** What the supply does to the pump, in a sentence; says when the voltages heard lie too close to tell. */
export function supplyFinding(bins: readonly SupplyBin[]): string {
  const told = bins.filter((bin) => bin.runs >= FEWEST)
  const [low, high] = [told[0], told[told.length - 1]]
  if (low === undefined || high === undefined || low === high)
    return 'The supply has hardly varied, so it explains no change in the recharge.'
  const change = high.rechargePaPerSecond / low.rechargePaPerSecond - 1
  const said =
    Math.abs(change) < 0.03
      ? 'as fast as'
      : `${formatShare(Math.abs(change))} ${change > 0 ? 'faster' : 'slower'} than`
  const at = (bin: SupplyBin) => `${bin.lowV.toFixed(1)} to ${bin.highV.toFixed(1)} V`
  return `At ${at(high)} it draws down ${said} at ${at(low)}.`
}
