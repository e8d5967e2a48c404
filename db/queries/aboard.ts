import type { Trx } from '@/db/roles'

export interface AboardRow {
  id: string
  value: 'aboard' | 'away'
  from: Date
  until: Date | null
}

/** What was said of people aboard that holds now or later, in its order. */
export async function readAboardSpans(trx: Trx, vesselId: string, at: Date): Promise<AboardRow[]> {
  return trx('statement')
    .where({ vessel_id: vesselId })
    .whereNull('system_id')
    .where((which) => void which.whereNull('until_at').orWhere('until_at', '>', at))
    .whereRaw('(until_at is null or until_at > from_at)')
    .orderBy(['from_at', 'id'])
    .select({ id: 'id', value: 'value', from: 'from_at', until: 'until_at' })
}

/**
 * Says something of people aboard for one span and leaves what was said of other times: statements that reach into
 * the span are cut at its ends. `value` null only clears the span.
 */
export async function sayAboardFor(
  trx: Trx,
  said: {
    vesselId: string
    value: 'aboard' | 'away' | null
    from: Date
    until: Date
    saidBy: string
    saidAt: Date
  },
): Promise<void> {
  const span = { vessel: said.vesselId, from: said.from, until: said.until }
  // What goes on after the span begins again there.
  await trx.raw(
    `insert into statement (vessel_id, value, from_at, until_at, said_by, said_at)
     select vessel_id, value, :until, until_at, said_by, said_at from statement
     where vessel_id = :vessel and system_id is null and from_at < :until and (until_at is null or until_at > :until)`,
    span,
  )
  await trx.raw(
    `update statement set until_at = greatest(from_at, cast(:from as timestamptz))
     where vessel_id = :vessel and system_id is null and from_at < :until and (until_at is null or until_at > :from)`,
    span,
  )
  if (said.value === null) return
  await trx('statement').insert({
    vessel_id: said.vesselId,
    value: said.value,
    from_at: said.from,
    until_at: said.until,
    said_by: said.saidBy,
    said_at: said.saidAt,
  })
}
