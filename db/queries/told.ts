import type { Trx } from '@/db/roles'

/** Was an event of this notice meant for the owner alone already? */
export async function ownersToldOf(trx: Trx, noticeId: string): Promise<boolean> {
  const row = await trx('notice_event')
    .where({ notice_id: noticeId })
    .whereRaw("evidence->>'audience' = 'owner'")
    .first('id')
  return row !== undefined
}
