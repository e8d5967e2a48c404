import { connect } from '@/db/knex'
import { migrate } from '@/db/migrate'
import { seedDemo } from '@/db/seeds/demo'
import { installQueue } from '@/lib/messages/install-queue'

/**
 * Brings a database up to date: schema, message queue and, for demo and tests, shops and people.
 * Safe to run again and by several at once (the migrations take a lock of their own).
 */
export async function prepareDatabase(
  url: string,
  options: { demo: boolean; demoPassword?: string | undefined },
): Promise<void> {
  const knex = connect(url, { max: 2 })
  try {
    await migrate(knex)
    await installQueue(url)
    if (options.demo) await seedDemo(knex, options.demoPassword ?? 'middle-watch-demo')
  } finally {
    await knex.destroy()
  }
}
