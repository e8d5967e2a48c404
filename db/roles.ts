import type { Knex } from 'knex'
import { database } from '@/db/knex'

/** A transaction under one of the two roles; the only thing query modules take. */
export type Trx = Knex.Transaction

/**
 * Runs `work` in one transaction as this person: row-level policies decide what exists for them.
 * @param personId the person's id; rows of others simply are not there.
 */
export function asPerson<T>(personId: string, work: (trx: Trx) => Promise<T>): Promise<T> {
  return database().transaction(async (trx) => {
    await trx.raw('set local role mw_person')
    await trx.raw("select set_config('app.person_id', ?, true)", [personId])
    return work(trx)
  })
}

/** Runs `work` in one transaction as the service itself: ingest, worker, and writes already decided on. */
export function asIngest<T>(work: (trx: Trx) => Promise<T>): Promise<T> {
  return database().transaction(async (trx) => {
    await trx.raw('set local role mw_ingest')
    return work(trx)
  })
}
