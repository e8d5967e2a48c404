import PgBoss from 'pg-boss'
import { asIngest } from '@/db/roles'
import { messageExists, noteAttempt, receiptOf, setFailed, lockMessage } from '@/db/queries/message-sending'
import { log } from '@/lib/log'
import { deliver } from '@/lib/messages/deliver'
import { DEAD_QUEUE, QUEUE, QUEUE_SCHEMA, type MessageJob } from '@/lib/messages/queue-settings'
import type { Services } from '@/lib/messages/services'

export interface Sending {
  /** Lets messages in hand finish, for so long at most. */
  stop(timeoutMs: number): Promise<void>
}

/** Messages in hand at once: each holds a connection while its service answers. */
const AT_ONCE = 6

/**
 * Takes messages from the queue and sends them until stopped.
 * @param clock the present, asked anew for each message.
 */
export async function startSending(url: string, services: Services, clock: () => Date): Promise<Sending> {
  const boss = new PgBoss({
    connectionString: url,
    schema: QUEUE_SCHEMA,
    application_name: 'middlewatch worker',
    max: 3,
    migrate: false,
    schedule: false,
    supervise: true,
    // A job whose worker was killed is found again within seconds (the queue looks at every second beat); the usual
    // two minutes are a long evening.
    maintenanceIntervalSeconds: 2,
    archiveCompletedAfterSeconds: 3600,
    deleteAfterDays: 14,
  })
  boss.on('error', (error) => log.error({ error: String(error) }, 'the message queue'))
  await boss.start()
  const options = { pollingIntervalSeconds: 0.5, batchSize: AT_ONCE }
  await boss.work<MessageJob>(QUEUE, options, async (jobs) => {
    await Promise.all(jobs.map((job) => sendOne(boss, job, services, clock)))
  })
  await boss.work<MessageJob>(DEAD_QUEUE, options, async (jobs) => {
    for (const job of jobs) await giveUp(job.data.messageId, clock())
  })
  return { stop: (timeoutMs) => boss.stop({ graceful: true, wait: true, timeout: timeoutMs }) }
}

async function sendOne(
  boss: PgBoss,
  job: PgBoss.Job<MessageJob>,
  services: Services,
  clock: () => Date,
): Promise<void> {
  const { messageId } = job.data
  try {
    const reason = await deliver(messageId, clock(), services)
    log.info({ messageId, reason }, 'message')
  } catch (error) {
    log.warn(
      { messageId, error: error instanceof Error ? error.message : String(error) },
      'message not sent yet',
    )
    // Failed here one by one: thrown, it would send the whole batch back.
    await boss.fail(QUEUE, job.id, { message: error instanceof Error ? error.message : String(error) })
  }
}

/** The last try is over: the manager sees the message as failed and can send it again. */
export async function giveUp(messageId: string, now: Date): Promise<void> {
  await asIngest(async (trx) => {
    if (!(await messageExists(trx, messageId))) return
    const message = await lockMessage(trx, messageId)
    if (message === null) throw new Error(`message ${messageId} is being sent`)
    if (message.acceptedAt !== null || message.failedAt !== null || message.cancelledAt !== null) return
    if ((await receiptOf(trx, messageId)) !== null) return
    const failure = 'given up: the service did not take it, however often it was tried'
    await setFailed(trx, messageId, now, failure)
    await noteAttempt(trx, messageId, now, 'refused', failure)
  })
}
