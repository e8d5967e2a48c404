import { database } from '@/db/knex'
import { migrate } from '@/db/migrate'
import { commandDatabase } from '@/lib/run/command-database'

/** `npm run migrate`: brings the database up to date. */
const end = await commandDatabase()
try {
  const names = await migrate(database())
  console.log(names.length === 0 ? 'The schema is up to date.' : `Ran ${names.join(', ')}`)
} finally {
  await database().destroy()
  await end()
}
