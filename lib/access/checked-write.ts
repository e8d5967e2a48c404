import { asIngest, asPerson, type Trx } from '@/db/roles'

/**
 * Decides as the person, then writes as the service: people hold few rights on tables, and what they may do
 * is said in one place. Whatever `check` finds is handed to `write`.
 */
export async function checkedWrite<Found, Result>(
  personId: string,
  check: (trx: Trx) => Promise<Found>,
  write: (trx: Trx, found: Found) => Promise<Result>,
): Promise<Result> {
  const found = await asPerson(personId, check)
  return asIngest((trx) => write(trx, found))
}

/**
 * Derives a system's record anew from an instant on, in the transaction of the change that asks for it.
 * Given to services by the route handlers, which alone may reach the folder that derives.
 */
export type Rederive = (trx: Trx, systemId: string, since: Date) => Promise<void>
