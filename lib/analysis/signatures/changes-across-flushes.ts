import { permutationTest } from '../statistics'
import { legScales, mean, type LegScale } from './leg-scales'
import type { SignatureFinding, SignatureInput } from './types'

const FEWEST_PAIRS = 6
const STEADY_PAIRS = 20
const STEADY_DAYS = 14
/** Beyond this many standard errors a leg differs from the one before. */
const CHANGED = 3

interface Pair {
  across: 'flush' | 'leak-run'
  /** Size of the change in standard errors. */
  change: number
}

/**
 * Does the leak change across flushes, across runs that the leak started, or across neither? A bowl valve seats
 * anew with each flush, a check valve with each run; fixed fittings stay. Judged by a permutation test of the
 * sizes of change from leg to leg. Fewer than 6 pairs either way: not enough.
 */
export function changesAcrossFlushes(input: SignatureInput): SignatureFinding {
  const signature = 'changes-across-flushes' as const
  const pairs = pairsOf(legScales(input.legs, input.standardPressurePa), input)
  const sizes = (across: Pair['across']) =>
    pairs.filter((pair) => pair.across === across).map((pair) => pair.change)
  const flush = sizes('flush')
  const leak = sizes('leak-run')
  if (flush.length < FEWEST_PAIRS || leak.length < FEWEST_PAIRS) {
    return { signature, enough: false, missing: `${FEWEST_PAIRS} changes of hold by flush and by leak each` }
  }
  const changed = (changes: readonly number[]) => changes.filter((change) => change > CHANGED).length
  const counts = `after flushes ${changed(flush)} of ${flush.length}, after leak runs ${changed(leak)} of ${leak.length}`
  const test = permutationTest(flush, leak, (a, b) => mean(a) - mean(b), { permutations: 999 })
  const flushMore = test !== null && test.pValue < 0.01 && test.observed > 0
  if (flushMore && changed(flush) >= 3) {
    return found(signature, 'bowl-valve', 4, `leak changes ${counts}`, 'changes across leak runs as well')
  }
  const share = (changed(flush) + changed(leak)) / pairs.length
  if (!flushMore && changed(leak) >= 4 && share > 0.2) {
    return found(
      signature,
      'check-valve',
      3.5,
      `leak changes ${counts}`,
      'a night of leak runs without a change',
    )
  }
  const days = (input.at - Math.min(...input.legs.map((leg) => leg.startedAt))) / 86_400_000
  if (share < 0.08 && pairs.length >= STEADY_PAIRS && days >= STEADY_DAYS) {
    return found(
      signature,
      'fixed-fitting',
      2,
      `leak steady for ${Math.round(days)} days: changes ${counts}`,
      'a change with a flush or a run',
    )
  }
  return { signature, enough: true, suspects: [] }
}

function found(
  signature: 'changes-across-flushes',
  family: 'bowl-valve' | 'check-valve' | 'fixed-fitting',
  strength: number,
  basis: string,
  overturnedBy: string,
): SignatureFinding {
  return { signature, enough: true, suspects: [{ family, strength, basis, overturnedBy }] }
}

/** Neighbouring legs with one flush or one leak run between them and no more than a short while. */
function pairsOf(scales: readonly LegScale[], { runs, flushes }: SignatureInput): Pair[] {
  return scales.slice(1).flatMap((here, index): Pair[] => {
    const before = scales[index]
    if (before === undefined) return []
    const from = before.leg.endedAt
    const to = here.leg.startedAt
    if (to - from > 1_800_000) return []
    const flushed = flushes.some((flush) => flush.at >= from - 60_000 && flush.at <= to)
    const ran = runs.filter((run) => run.startedAt >= from - 60_000 && run.startedAt <= to)
    const onlyLeak = ran.length === 1 && ran[0]?.trigger === 'leak' && !flushed
    if (!flushed && !onlyLeak) return []
    const change = Math.abs(here.logScale - before.logScale) / Math.hypot(here.sigma, before.sigma)
    return [{ across: flushed ? 'flush' : 'leak-run', change }]
  })
}
