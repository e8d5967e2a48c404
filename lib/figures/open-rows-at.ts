import type { Trx } from '@/db/roles'
import { openRows, type Instant, type OpenRows } from '@/lib/analysis/fold'
import { stateAt } from '@/lib/figures/state-at'

/** The run, hold and leg that were open at `at`: to be shown after the rows known then. Service's role. */
export async function openRowsAt(trx: Trx, systemId: string, at: Instant): Promise<OpenRows> {
  return openRows((await stateAt(trx, systemId, at)).state)
}
