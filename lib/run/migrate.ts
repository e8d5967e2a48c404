import { connect } from '@/db/knex'
import { migrate } from '@/db/migrate'

/** `npm run migrate`: brings the database of DATABASE_URL up to date. */
const url = process.env.DATABASE_URL
if (url === undefined || url === '') {
  console.error('Set DATABASE_URL to the database to be brought up to date.')
  process.exit(1)
}
const knex = connect(url, { max: 1 })
try {
  const names = await migrate(knex)
  console.log(names.length === 0 ? 'The schema is up to date.' : `Ran ${names.join(', ')}`)
} finally {
  await knex.destroy()
}
