import PgBoss from 'pg-boss'
import type { Trx } from '@/db/roles'
import { QUEUE, QUEUE_SCHEMA, type MessageJob } from '@/lib/messages/queue-settings'

interface DriverConnection {
  query(text: string, values?: unknown[]): Promise<{ rows: unknown[] }>
}

/** The transaction's own connection, in the form the queue takes: job and message commit together or not at all. */
async function connectionOf(trx: Trx): Promise<PgBoss.Db> {
  // Knex does not type what it keeps inside a transaction; it is the driver's client.
  const connection = (await trx.client.acquireConnection()) as DriverConnection
  return { executeSql: (text, values) => connection.query(text, values) as Promise<{ rows: never[] }> }
}

/** A sender that never opens a connection of its own: every call brings the caller's. */
const sender = new PgBoss({
  db: { executeSql: () => Promise.reject(new Error('a job is only sent within a transaction')) },
  schema: QUEUE_SCHEMA,
  supervise: false,
  schedule: false,
  migrate: false,
})

/**
 * Queues the sending of a message in the transaction that wrote it.
 * @param sendAfter not before this instant.
 */
export async function enqueue(trx: Trx, messageId: string, sendAfter: Date): Promise<void> {
  const job: MessageJob = { messageId }
  await sender.send(QUEUE, job, { db: await connectionOf(trx), startAfter: sendAfter })
}
