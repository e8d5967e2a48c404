import { readOutlookTally } from '@/db/queries/outlook-score'
import { asPerson } from '@/db/roles'
import type { OutlookScore } from '@/shared/schemas'

const NIGHTS = 30
const DAY_MS = 86_400_000

/**
 * How the outlooks of the last 30 nights came out, over the systems the person sees, and whether they did better
 * than always foretelling the base rate (whose Brier score is p(1 − p), p the share of nights that ran).
 */
export async function getOutlookScore(personId: string, now: Date): Promise<OutlookScore> {
  const span = { from: new Date(now.getTime() - NIGHTS * DAY_MS), to: now }
  const tally = await asPerson(personId, (trx) => readOutlookTally(trx, span))
  const { hit, missed, quiet, rated, ran, brier } = tally
  const share = rated === 0 ? null : ran / rated
  return {
    from: span.from.toISOString(),
    to: span.to.toISOString(),
    nights: hit + tally.false + missed + quiet,
    outcomes: { hit, false: tally.false, missed, quiet },
    brier,
    baseRateBrier: share === null ? null : share * (1 - share),
    rated,
  }
}
