import type { Trx } from '@/db/roles'
import { outlookOf } from '@/lib/analysis/outlook'
import type { Outlook } from '@/lib/analysis/outlook/types'
import { outlookInput } from '@/lib/outlook/outlook-input'

/**
 * What the coming night (or the one under way) brings a system, from what was known at `at`.
 * @param trx under the service's role: the outlook of a boat is the same for everybody who may see it.
 * @throws Error when there is no such system.
 */
export async function outlookAt(trx: Trx, systemId: string, at: Date): Promise<Outlook> {
  return outlookOf(await outlookInput(trx, systemId, at))
}
