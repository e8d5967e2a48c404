import type { Trx } from '@/db/roles'
import { storeFigures } from '@/lib/figures'
import { log } from '@/lib/log'
import { judgeSystem } from '@/lib/notices'

/** Computes a system's figures from its rows as they are now, keeps them, and judges by them what is to be told. */
export async function judge(trx: Trx, systemId: string, now: Date): Promise<void> {
  const figures = await storeFigures(trx, systemId, now.getTime())
  try {
    // A savepoint: what cannot be judged must not refuse the readings. The next upload judges again.
    await trx.transaction((inner) => judgeSystem(inner, systemId, now, figures))
  } catch (error) {
    log.error({ systemId, error: String(error) }, 'the notices of this system could not be judged')
  }
}
