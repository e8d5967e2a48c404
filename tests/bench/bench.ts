import path from 'node:path'
import { gzipSync } from 'node:zlib'
import { connect, database, type Knex } from '@/db/knex'
import { startLocalServer } from '@/db/local-server'
import { insertSamples } from '@/db/queries/samples'
import { lockStates } from '@/db/queries/system-state'
import { asIngest } from '@/db/roles'
import { check } from '@/ingest/check'
import { derive } from '@/ingest/derive'
import { parseSenml } from '@/ingest/parse-senml'
import { rebuildSystem } from '@/ingest/rederive'
import { store } from '@/ingest/store'
import { initialState, step, type FoldItem } from '@/lib/analysis/fold'
import { summaryAt } from '@/lib/figures'
import { prepareDatabase } from '@/lib/run/prepare-database'
import { newBoat, readingsOf, send, senml, type Boat, type Reading } from '../support/boats'

const ROOT = path.resolve(import.meta.dirname, '../..')
const NAME = 'middlewatch_bench'
const DAY_SECONDS = 86_400
const NOW = new Date()
const END_SECONDS = Math.floor(NOW.getTime() / 1000 / DAY_SECONDS) * DAY_SECONDS

/** `npm run bench`: one JSON line a figure; `limit` is what it should not be beyond. */
async function main(): Promise<void> {
  const server = process.env.BENCH_SERVER_URL
    ? null
    : await startLocalServer({ dataFolder: path.join(ROOT, '.data', 'bench-postgres') })
  const adminUrl = process.env.BENCH_SERVER_URL ?? server?.url ?? ''
  const admin = connect(adminUrl, { max: 1 })
  await admin.raw('drop database if exists ?? with (force)', [NAME])
  await admin.raw('create database ??', [NAME])
  const url = new URL(adminUrl)
  url.pathname = `/${NAME}`
  process.env.DATABASE_URL = url.href
  const knex = connect(url.href, { max: 2 })
  try {
    await prepareDatabase(url.href, { demo: false })
    await benchAll(knex)
  } finally {
    await knex.destroy()
    await database().destroy()
    await admin.raw('drop database ?? with (force)', [NAME])
    await admin.destroy()
    await server?.stop()
  }
}

async function benchAll(knex: Knex): Promise<void> {
  benchFold()
  await benchLoading(knex)
  await benchBacklog(knex)
  await benchOne(knex)
  await benchYear(knex)
}

function say(name: string, value: number, unit: string, limit?: number): void {
  const shown = Number(value.toPrecision(4))
  console.log(JSON.stringify({ name, value: shown, unit, ...(limit === undefined ? {} : { limit }) }))
}

async function seconds(work: () => Promise<unknown>): Promise<number> {
  const began = performance.now()
  await work()
  return (performance.now() - began) / 1000
}

const median = (values: number[]): number =>
  values.sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? NaN

/** Sends readings in packs that fit the limits, and insists on being taken. */
async function upload(boat: Boat, readings: readonly Reading[]): Promise<void> {
  for (let from = 0; from < readings.length; from += 150_000) {
    const pack = senml(boat.serial, readings.slice(from, from + 150_000))
    const body = new Uint8Array(gzipSync(JSON.stringify(pack), { level: 1 }))
    const { status, body: answer } = await send(boat, body, {
      at: NOW,
      headers: { 'content-encoding': 'gzip' },
    })
    if (status !== 200) throw new Error(`answered ${status}: ${answer.detail}`)
  }
}

/** The arithmetic alone, in memory. */
function benchFold(): void {
  const readings = readingsOf({
    fromSeconds: END_SECONDS - 30 * DAY_SECONDS,
    hours: 720,
    intervalSeconds: 15,
  })
  const items = readings.map((reading): FoldItem => ({
    type: 'sample',
    sample: {
      at: reading.t * 1000,
      vacuumPa: reading.vacuum ?? null,
      pumpOn: reading.pump ?? null,
      airC: reading.air ?? null,
      barometerPa: reading.barometer ?? null,
      supplyV: reading.supply ?? null,
    },
  }))
  const state = initialState()
  const began = performance.now()
  let rows = 0
  for (const item of items) rows += step(state, item).length
  say('fold', items.length / ((performance.now() - began) / 1000), 'samples/s')
  say('fold-rows', rows, 'rows')
}

/** How near to a bare COPY the way from bytes to stored samples comes. */
async function benchLoading(knex: Knex): Promise<void> {
  const readings = readingsOf({
    fromSeconds: END_SECONDS - 30 * DAY_SECONDS,
    hours: 720,
    intervalSeconds: 15,
    weatherSeconds: 15,
  })
  const [bare, whole] = [await newBoat(knex), await newBoat(knex)]
  const body = JSON.stringify(senml(whole.serial, readings))
  const against = {
    receiptMs: NOW.getTime(),
    offsetSeconds: 0,
    shiftSeconds: 0,
    sealed: [],
    otherLoggers: new Set<number>(),
  }
  const { batch } = check(await parseSenml(body, NOW.getTime()), against)
  const parsing = await seconds(() => parseSenml(body, NOW.getTime()))
  const copying = await seconds(() => asIngest((trx) => insertSamples(trx, bare.loggerId, '1', batch)))
  const storing = await seconds(() =>
    asIngest(async (trx) => {
      const { batch: parsed } = check(await parseSenml(body, NOW.getTime()), against)
      await store(trx, whole.loggerId, '1', parsed)
    }),
  )
  say('parse', body.length / 1e6 / parsing, 'MB/s')
  say('copy', batch.count / copying, 'samples/s')
  say('parse-check-store', batch.count / storing, 'samples/s')
  say('parse-check-store-to-copy', copying / storing, 'ratio')
}

/** A boat back from sea: 30 days of a quick logger with five channels, to rows and figures. */
async function benchBacklog(knex: Knex): Promise<void> {
  const boat = await newBoat(knex, { intervalSeconds: 15 })
  const readings = readingsOf({
    fromSeconds: END_SECONDS - 30 * DAY_SECONDS,
    hours: 720,
    intervalSeconds: 15,
    weatherSeconds: 15,
  })
  const body = new Uint8Array(gzipSync(JSON.stringify(senml(boat.serial, readings))))
  const headers = { 'content-encoding': 'gzip' }
  const first = await seconds(() => send(boat, body, { at: NOW, headers }))
  say('backlog-30-days-of-15-s', first, 's', 8)
  say('backlog-rate', readings.length / first, 'samples/s')
  say('backlog-sent-again', await seconds(() => send(boat, body, { at: NOW, headers })), 's')
  let items = 0
  const anew = await seconds(() =>
    asIngest(async (trx) => {
      items = (await rebuildSystem(trx, boat.systemId, NOW))?.items ?? 0
    }),
  )
  say('rebuild', items / anew, 'samples/s')
}

/** The usual: one sample more onto a week. */
async function benchOne(knex: Knex): Promise<void> {
  const boat = await newBoat(knex)
  const readings = readingsOf({ fromSeconds: END_SECONDS - 7 * DAY_SECONDS, hours: 168 })
  const cut = readings.length - 200
  await upload(boat, readings.slice(0, cut))
  const times: number[] = []
  for (const reading of readings.slice(cut)) times.push(await seconds(() => upload(boat, [reading])))
  say('one-sample-upload', median(times) * 1000, 'ms')
  const reads: number[] = []
  for (let i = 0; i < 20; i += 1)
    reads.push(await seconds(() => asIngest((trx) => summaryAt(trx, boat.systemId, NOW.getTime()))))
  say('summary-now', median(reads) * 1000, 'ms')
}

/** What a year of history costs the day that comes after it, and the hour that comes late. */
async function benchYear(knex: Knex): Promise<void> {
  const DAYS = 365
  const REPEATS = 5
  const readings = readingsOf({ fromSeconds: END_SECONDS - DAYS * DAY_SECONDS, hours: DAYS * 24 })
  const dayOf = (day: number) => {
    const from = END_SECONDS - DAYS * DAY_SECONDS + day * DAY_SECONDS
    return readings.filter(({ t }) => t >= from && t < from + DAY_SECONDS)
  }
  const lastDays = Array.from({ length: REPEATS }, (_, i) => dayOf(DAYS - REPEATS + i))
  const startOfLast = lastDays[0]?.[0]?.t ?? 0
  const middle = END_SECONDS - Math.floor(DAYS / 2) * DAY_SECONDS + 10 * 3600
  const isLate = ({ t }: Reading) => t >= middle && t < middle + 3600

  const old = await newBoat(knex)
  const history = readings.filter((reading) => reading.t < startOfLast && !isLate(reading))
  say('year-ingested', history.length / (await seconds(() => upload(old, history))), 'samples/s')

  const ontoYear: number[] = []
  const ontoNothing: number[] = []
  for (const day of lastDays) {
    const fresh = await newBoat(knex)
    ontoNothing.push(await seconds(() => upload(fresh, day)))
    ontoYear.push(await seconds(() => upload(old, day)))
  }
  say('day-onto-nothing', median(ontoNothing) * 1000, 'ms')
  say('day-onto-a-year', median(ontoYear) * 1000, 'ms')
  say('day-onto-a-year-to-nothing', median(ontoYear) / median(ontoNothing), 'ratio', 1.3)

  const late = readings.filter(isLate)
  let items = 0
  const taken = await seconds(() =>
    asIngest(async (trx) => {
      const { batch } = check(await parseSenml(JSON.stringify(senml(old.serial, late)), NOW.getTime()), {
        receiptMs: NOW.getTime(),
        offsetSeconds: 0,
        shiftSeconds: 0,
        sealed: [],
        otherLoggers: new Set(),
      })
      const [locked] = await lockStates(trx, [old.systemId])
      await store(trx, old.loggerId, '1', batch)
      const ends = { fromMs: batch.at[0] ?? 0, toMs: batch.at[batch.count - 1] ?? 0 }
      if (locked !== undefined) items = (await derive(trx, locked, ends)).items
    }),
  )
  say('late-hour-into-a-year', taken * 1000, 'ms')
  say('late-hour-replayed', items, 'samples', 15_000)
  say('late-hour-after-it', readings.filter(({ t }) => t >= middle).length, 'samples')
}

await main()
