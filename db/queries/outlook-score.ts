import type { Trx } from '@/db/roles'

export interface OutlookTally {
  hit: number
  false: number
  missed: number
  quiet: number
  /** Nights with a chance told beforehand, how many of them ran, and their mean squared error; null without any. */
  rated: number
  ran: number
  brier: number | null
}

/**
 * How the nights that ended in [from, to) came out, over the systems that the asker sees. Nights that were not
 * heard whole count nowhere.
 */
export async function readOutlookTally(trx: Trx, span: { from: Date; to: Date }): Promise<OutlookTally> {
  const { rows } = await trx.raw<{ rows: OutlookTally[] }>(
    `select count(*) filter (where outcome = 'hit')::int as hit,
       count(*) filter (where outcome = 'false')::int as "false",
       count(*) filter (where outcome = 'missed')::int as missed,
       count(*) filter (where outcome = 'quiet')::int as quiet,
       count(chance)::int as rated,
       count(chance) filter (where outcome in ('hit', 'missed'))::int as ran,
       avg(power(chance::float8 - case when outcome in ('hit', 'missed') then 1 else 0 end, 2)) as brier
     from outlook
     where outcome in ('hit', 'false', 'missed', 'quiet') and quiet_to >= :from and quiet_to < :to`,
    span,
  )
  return rows[0] ?? { hit: 0, false: 0, missed: 0, quiet: 0, rated: 0, ran: 0, brier: null }
}
