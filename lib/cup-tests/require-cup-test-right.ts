import type { Standing } from '@/db/queries/access'
import type { Trx } from '@/db/roles'
import { requireSystemRight } from '@/lib/access/require-right'
import { Problem } from '@/lib/problem'

const ROLES = ['technician', 'manager']

/**
 * Cup tests are the owner's, and of the shop's technicians and managers who may see the full record.
 * @throws Problem `not-found` without sight, `not-allowed` without the right
 */
export async function requireCupTestRight(trx: Trx, systemId: string): Promise<Standing> {
  const standing = await requireSystemRight(trx, systemId, 'fullRecord')
  if (standing.owns || standing.keeps || standing.roles.some((role) => ROLES.includes(role))) return standing
  throw new Problem('not-allowed', 'Cup tests are done by the owner, a technician or the shop’s manager.')
}
