import PgBoss from 'pg-boss'
import { connect } from '@/db/knex'
import type { Trx } from '@/db/roles'
import { DEAD_QUEUE, QUEUE, QUEUE_OPTIONS, QUEUE_SCHEMA } from '@/lib/messages/queue-settings'

/**
 * Installs the queue's own schema, its two queues and the rights of the service role. Safe to run again, and by
 * several at once.
 * @param url connection string of a role that may create schemas.
 */
export async function installQueue(url: string): Promise<void> {
  const knex = connect(url, { max: 1 })
  try {
    await knex.transaction(async (trx) => {
      // The queue's own installation deadlocks when two processes meet in it.
      await trx.raw("select pg_advisory_xact_lock(hashtext('middlewatch queue'))")
      await createQueues(url)
      await grantQueue(trx)
    })
  } finally {
    await knex.destroy()
  }
}

async function createQueues(url: string): Promise<void> {
  const boss = new PgBoss({
    connectionString: url,
    schema: QUEUE_SCHEMA,
    max: 1,
    supervise: false,
    schedule: false,
    migrate: true,
  })
  // Errors of its pool are thrown by the calls below as well; without a listener they would end the process.
  boss.on('error', () => {})
  await boss.start()
  try {
    await boss.createQueue(DEAD_QUEUE)
    await boss.createQueue(QUEUE, { ...QUEUE_OPTIONS })
    await boss.updateQueue(QUEUE, { ...QUEUE_OPTIONS })
  } finally {
    await boss.stop({ graceful: false })
  }
}

async function grantQueue(trx: Trx): Promise<void> {
  await trx.raw('grant usage on schema ?? to mw_ingest', [QUEUE_SCHEMA])
  await trx.raw('grant select, insert, update, delete on all tables in schema ?? to mw_ingest', [
    QUEUE_SCHEMA,
  ])
}
