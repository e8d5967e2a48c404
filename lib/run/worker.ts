import cron from 'node-cron'
import { database } from '@/db/knex'
import { asIngest } from '@/db/roles'
import { catchUpOne } from '@/ingest/rederive'
import { retain } from '@/ingest/retention'
import { env } from '@/lib/env'
import { log } from '@/lib/log'
import { installQueue } from '@/lib/messages/install-queue'
import { startSending } from '@/lib/messages/sending'
import { openServices } from '@/lib/messages/services'
import { HOUR_TICKS, MINUTE_TICKS, runTicks } from '@/lib/ticks'
import type { Tick } from '@/lib/ticks/run-tick'

/** So long messages in hand may take when the process is asked to end. */
const STOP_TIMEOUT_MS = 8_000

/** Systems derived anew in one go; the rest wait for the next minute. */
const CATCH_UP_AT_ONCE = 50

/** Months that have served their time are sealed, then dropped, by the owner of the tables. */
const retentionTick: Tick = {
  name: 'retention',
  role: 'owner',
  work: (trx, now) => retain(trx, now, env().retentionDays),
}

/** Systems whose dated facts or whose deriver changed are brought up to date, each in its own transaction. */
async function catchUp(): Promise<void> {
  try {
    for (let count = 0; count < CATCH_UP_AT_ONCE; count += 1) {
      const systemId = await asIngest((trx) => catchUpOne(trx, new Date()))
      if (systemId === null) return
      log.info({ systemId }, 'derived anew')
    }
  } catch (error) {
    log.error({ error: String(error) }, 'deriving anew failed')
  }
}

/** The worker process: sends messages and asks, every minute and every hour, what is due. */
async function main(): Promise<void> {
  const { databaseUrl } = env()
  if (databaseUrl === undefined) throw new Error('DATABASE_URL is not set')
  await installQueue(databaseUrl)
  const services = openServices(env())
  const sending = await startSending(databaseUrl, services, () => new Date())
  const running = new Set<Promise<unknown>>()
  const run = (ticks: Tick[]): Promise<unknown> => {
    const work: Promise<unknown> = catchUp()
      .then(() => runTicks(ticks, new Date()))
      .finally(() => running.delete(work))
    running.add(work)
    return work
  }
  const tasks = [
    cron.schedule('* * * * *', () => run(MINUTE_TICKS), { name: 'minute', noOverlap: true }),
    cron.schedule('7 * * * *', () => run([...HOUR_TICKS, retentionTick]), { name: 'hour', noOverlap: true }),
  ]

  let stopping = false
  const stop = async (): Promise<void> => {
    if (stopping) return
    stopping = true
    await Promise.all(tasks.map((task) => task.stop()))
    await sending.stop(STOP_TIMEOUT_MS)
    await Promise.race([
      Promise.allSettled([...running]),
      new Promise((resolve) => setTimeout(resolve, STOP_TIMEOUT_MS).unref()),
    ])
    services.close()
    await database().destroy()
    process.exit(0)
  }
  process.once('SIGTERM', () => void stop())
  process.once('SIGINT', () => void stop())

  console.log('worker ready')
  await run([...MINUTE_TICKS, ...HOUR_TICKS, retentionTick])
}

// The queue reports what it finished without waiting for the answer; a database that restarts at that moment
// must not end the worker, since the job is found again and its message known as accepted.
process.on('unhandledRejection', (reason) => log.error({ error: String(reason) }, 'unhandled rejection'))

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : String(error))
  process.exit(1)
})
