import type { Trx } from '@/db/roles'

/** Urgent notices opened before `openedBefore` that nobody acknowledged, snoozed or passed on, and that are not held. */
export async function unansweredUrgent(
  trx: Trx,
  openedBefore: Date,
): Promise<{ id: string; evidence: Record<string, unknown> }[]> {
  const rows = await trx('notice as n')
    .where('n.kind', 'running-on')
    .whereNull('n.closed_at')
    .whereNull('n.acknowledged_at')
    .whereNull('n.held_since')
    .whereNull('n.snoozed_until')
    .where('n.opened_at', '<=', openedBefore)
    .whereNotExists(
      trx('notice_event as e')
        .where('e.transition', 'escalated')
        .whereRaw('e.notice_id = n.id')
        .select(trx.raw('1')),
    )
    .orderBy('n.id')
    .select<{ id: string; evidence: Record<string, unknown> }[]>('n.id', 'n.evidence')
  return rows.map((row) => ({ id: String(row.id), evidence: row.evidence }))
}
