import { readFileSync } from 'node:fs'
import { send } from '../support/boats'

/** Takes one upload in, in a process of its own that may be killed: arguments are key, file and time of receipt. */
const [, , key = '', file = '', at = ''] = process.argv
const { status } = await send({ key }, new Uint8Array(readFileSync(file)), {
  at: new Date(at),
  headers: { 'content-encoding': 'gzip' },
})
process.stdout.write(`answered ${status}\n`)
process.exit(0)
