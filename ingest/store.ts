import {
  anyStored,
  COPY_ABOVE,
  fillSamples,
  insertSamples,
  replaceSamples,
  rollUpHours,
  storedAt,
  type SampleColumns,
  type StoredSample,
} from '@/db/queries/samples'
import type { Trx } from '@/db/roles'
import type { Batch } from '@/ingest/check'

const HOUR_MS = 3_600_000

export interface Stored {
  stored: number
  duplicate: number
  conflicting: number
  /** Times whose stored sample is new or another than before, ascending, epoch milliseconds. */
  changed: Float64Array
}

/** What becomes of each sample of a batch, as positions in it. */
interface Fates {
  add: number[]
  fill: number[]
  replace: number[]
  changed: number[]
  stored: number
  duplicate: number
  conflicting: number
}

/**
 * Stores a batch beside what is there: the first value of a channel stands, missing ones are filled in, and a
 * logger's own sample takes the place of an import's. The logger must be locked by this transaction.
 * @param how.onlyNewTimes true for what a person imports: times that are stored already stay as they are.
 */
export async function store(
  trx: Trx,
  loggerId: string,
  uploadId: string,
  batch: Batch,
  how: { onlyNewTimes: boolean } = { onlyNewTimes: false },
): Promise<Stored> {
  const fates: Fates = {
    add: [],
    fill: [],
    replace: [],
    changed: [],
    stored: 0,
    duplicate: 0,
    conflicting: 0,
  }
  for (let from = 0; from < batch.count; from += COPY_ABOVE) {
    const to = Math.min(from + COPY_ABOVE, batch.count)
    judge(batch, from, to, await thoseStored(trx, loggerId, batch, from, to), fates, how.onlyNewTimes)
  }
  await insertSamples(trx, loggerId, uploadId, pick(batch, fates.add))
  await fillSamples(trx, loggerId, pick(batch, fates.fill))
  await replaceSamples(trx, loggerId, uploadId, pick(batch, fates.replace))
  const changed = Float64Array.from(fates.changed, (position) => batch.at[position] ?? 0)
  await rollUpHours(trx, loggerId, hoursOf(changed))
  return { stored: fates.stored, duplicate: fates.duplicate, conflicting: fates.conflicting, changed }
}

async function thoseStored(
  trx: Trx,
  loggerId: string,
  batch: Batch,
  from: number,
  to: number,
): Promise<StoredSample[]> {
  const times = Array.from(batch.at.subarray(from, to))
  const [first = 0] = times
  // The usual backlog lies where nothing is stored yet: one look spares five thousand.
  if (times.length > 100 && !(await anyStored(trx, loggerId, first, times.at(-1) ?? first))) return []
  return storedAt(trx, loggerId, times)
}

function judge(
  batch: Batch,
  from: number,
  to: number,
  there: StoredSample[],
  fates: Fates,
  onlyNewTimes: boolean,
): void {
  let next = 0
  for (let i = from; i < to; i += 1) {
    const old = there[next]
    if (old === undefined || old.atMs !== batch.at[i]) {
      fates.add.push(i)
      fates.changed.push(i)
      count(fates, batch.conflicting[i] === 1, true)
      continue
    }
    next += 1
    const { differs, fills } = compare(batch, i, old)
    if (onlyNewTimes) {
      count(fates, differs || batch.conflicting[i] === 1, false)
      continue
    }
    if (old.imported) {
      fates.replace.push(i)
      // An import's sample that said the same changes hands, and no row changes by it.
      if (differs || fills || lacks(batch, i, old)) fates.changed.push(i)
      count(fates, batch.conflicting[i] === 1, true)
      continue
    }
    if (fills) {
      fates.fill.push(i)
      fates.changed.push(i)
    }
    count(fates, differs || batch.conflicting[i] === 1, fills)
  }
}

function count(fates: Fates, conflicting: boolean, stored: boolean): void {
  if (conflicting) fates.conflicting += 1
  else if (stored) fates.stored += 1
  else fates.duplicate += 1
}

function compare(batch: Batch, i: number, old: StoredSample): { differs: boolean; fills: boolean } {
  let differs = false
  let fills = false
  const look = (sent: number | undefined, there: number | null) => {
    if (sent === undefined || Number.isNaN(sent)) return
    if (there === null) fills = true
    else if (there !== sent) differs = true
  }
  look(batch.vacuumPa[i], old.vacuumPa)
  look(batch.airC[i], old.airC)
  look(batch.barometerPa[i], old.barometerPa)
  look(batch.supplyV[i], old.supplyV)
  const pump = batch.pumpOn[i]
  look(pump === -1 ? NaN : pump, old.pumpOn === null ? null : Number(old.pumpOn))
  return { differs, fills }
}

/** The stored sample has a channel that the batch's has not. */
function lacks(batch: Batch, i: number, old: StoredSample): boolean {
  const gone = (sent: number | undefined, there: number | null) => Number.isNaN(sent) && there !== null
  return (
    gone(batch.vacuumPa[i], old.vacuumPa) ||
    gone(batch.airC[i], old.airC) ||
    gone(batch.barometerPa[i], old.barometerPa) ||
    gone(batch.supplyV[i], old.supplyV) ||
    (batch.pumpOn[i] === -1 && old.pumpOn !== null)
  )
}

function pick(batch: Batch, positions: number[]): SampleColumns {
  if (positions.length === batch.count) return batch
  const column = (values: Float64Array) => Float64Array.from(positions, (position) => values[position] ?? NaN)
  return {
    count: positions.length,
    at: column(batch.at),
    vacuumPa: column(batch.vacuumPa),
    airC: column(batch.airC),
    barometerPa: column(batch.barometerPa),
    supplyV: column(batch.supplyV),
    pumpOn: Int8Array.from(positions, (position) => batch.pumpOn[position] ?? -1),
  }
}

function hoursOf(times: Float64Array): number[] {
  const hours: number[] = []
  for (const time of times) {
    const hour = Math.floor(time / HOUR_MS) * HOUR_MS
    if (hours.at(-1) !== hour) hours.push(hour)
  }
  return hours
}
