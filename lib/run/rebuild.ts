import { parseArgs } from 'node:util'
import { database } from '@/db/knex'
import { allSystemIds } from '@/db/queries/system-state'
import { asIngest } from '@/db/roles'
import { rebuildSystem } from '@/ingest/rederive'
import { commandDatabase } from '@/lib/run/command-database'

const USAGE = 'Say which: npm run rebuild -- --system ID   or   npm run rebuild -- --all'

/** `npm run rebuild`: derives systems anew from their samples; the result is the same to the byte. */
async function main(): Promise<void> {
  const { values } = parseArgs({ options: { system: { type: 'string' }, all: { type: 'boolean' } } })
  if ((values.system === undefined) === (values.all !== true) || !/^\d*$/.test(values.system ?? '')) {
    console.error(USAGE)
    process.exitCode = 1
    return
  }
  const end = await commandDatabase()
  try {
    const ids = values.system === undefined ? await asIngest(allSystemIds) : [values.system]
    for (const id of ids) await rebuildOne(id)
  } finally {
    await database().destroy()
    await end()
  }
}

async function rebuildOne(id: string): Promise<void> {
  const began = performance.now()
  // One transaction a system: its readers see the old rows until the new ones are whole.
  const derived = await asIngest((trx) => rebuildSystem(trx, id, new Date()))
  if (derived === null) {
    console.error(`There is no system ${id}.`)
    process.exitCode = 1
    return
  }
  console.log(`system ${id}: ${derived.items} items in ${((performance.now() - began) / 1000).toFixed(1)} s`)
}

await main()
