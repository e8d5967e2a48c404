import { CHANNELS, REASONS, reasonCode, type Reason, type RecordColumns } from '@/ingest/records'
import { STANDARD_PRESSURE_PA } from '@/shared/units'

export const FUTURE_MS = 2 * 60_000
export const TOO_OLD_MS = 400 * 86_400_000
/** How many refused records an answer names; it counts all. */
const NAMED_REFUSALS = 100

/** Samples of one logger, ascending in time, one entry a distinct time; NaN (pump: -1) = not measured. */
export interface Batch {
  count: number
  /** Epoch milliseconds. */
  at: Float64Array
  vacuumPa: Float64Array
  airC: Float64Array
  barometerPa: Float64Array
  supplyV: Float64Array
  pumpOn: Int8Array
  /** 1 where the upload contradicts itself at that time: the first value stands. */
  conflicting: Uint8Array
}

export interface Checked {
  batch: Batch
  /** Distinct times none of whose records was usable. */
  rejectedSamples: number
  /** The first hundred refused records, in the order of the upload. */
  rejected: { index: number; reason: Reason }[]
  rejectedRecords: number
}

export interface CheckAgainst {
  receiptMs: number
  /** The logger's clock minus ours, seconds; taken off before a time is called future. */
  offsetSeconds: number
  /** What sample times are shifted by, seconds (0 unless the clock is over two minutes off). */
  shiftSeconds: number
  /** Spans, half-open, whose samples are final: [from, to) epoch milliseconds. */
  sealed: readonly { fromMs: number; toMs: number }[]
  /** Positions in `names` of names that hold another logger's serial. */
  otherLoggers: ReadonlySet<number>
}

/**
 * Judges every record, shifts times by the clock's offset and merges records of one time into samples. Writes the
 * judged reasons and shifted times into `records`.
 */
export function check(records: RecordColumns, against: CheckAgainst): Checked {
  judgeTimes(records, against)
  const order = timeOrder(records)
  const batch = emptyBatch(records.count)
  let rejectedSamples = 0
  for (let from = 0; from < order.length;) {
    const at = records.at[order[from] ?? 0] ?? NaN
    let to = from + 1
    while (to < order.length && records.at[order[to] ?? 0] === at) to += 1
    if (!mergeOne(records, order, from, to, at, batch)) rejectedSamples += 1
    from = to
  }
  return { batch: trimmed(batch), rejectedSamples, ...refusals(records) }
}

function judgeTimes(records: RecordColumns, against: CheckAgainst): void {
  const { receiptMs, otherLoggers } = against
  const shiftMs = Math.round(against.shiftSeconds * 1000)
  const offsetMs = against.offsetSeconds * 1000
  const [future, tooOld, otherLogger] = [
    reasonCode('future'),
    reasonCode('too-old'),
    reasonCode('other-logger'),
  ]
  for (let i = 0; i < records.count; i += 1) {
    let at = records.at[i] ?? NaN
    if (Number.isNaN(at)) continue
    const ahead = at - receiptMs - (records.relative[i] === 1 ? 0 : offsetMs)
    if (shiftMs !== 0 && records.relative[i] === 0) at -= shiftMs
    records.at[i] = at
    if (otherLoggers.has(records.name[i] ?? -1)) records.reason[i] = otherLogger
    else if (records.reason[i] !== 0) continue
    else if (ahead > FUTURE_MS) records.reason[i] = future
    else if (
      at < receiptMs - TOO_OLD_MS ||
      against.sealed.some((span) => at >= span.fromMs && at < span.toMs)
    )
      records.reason[i] = tooOld
  }
}

/** Positions of the entries with a readable time, ascending in time, in the upload's order within one time. */
function timeOrder(records: RecordColumns): Uint32Array {
  const order = new Uint32Array(records.count)
  let length = 0
  let sorted = true
  let last = -Infinity
  for (let i = 0; i < records.count; i += 1) {
    const at = records.at[i] ?? NaN
    if (Number.isNaN(at)) continue
    if (at < last) sorted = false
    last = at
    order[length] = i
    length += 1
  }
  const usable = order.subarray(0, length)
  const { at } = records
  return sorted ? usable : usable.sort((a, b) => (at[a] ?? 0) - (at[b] ?? 0) || a - b)
}

/** The channels of the sample being merged; one for all, since there may be a million. */
const MERGED = new Float64Array(CHANNELS.length)

/** Merges the entries of one time into the next sample of the batch; false when none of them was usable. */
function mergeOne(
  records: RecordColumns,
  order: Uint32Array,
  from: number,
  to: number,
  at: number,
  batch: Batch,
): boolean {
  MERGED.fill(NaN)
  let vacuumEntry = -1
  let conflicting = 0
  let usable = 0
  for (let k = from; k < to; k += 1) {
    const i = order[k] ?? 0
    if (records.reason[i] !== 0) continue
    const channel = records.channel[i] ?? 0
    const value = records.value[i] ?? NaN
    const stands = MERGED[channel] ?? NaN
    if (Number.isNaN(stands)) {
      MERGED[channel] = value
      if (channel === 1) vacuumEntry = i
      usable += 1
    } else if (stands !== value) conflicting = 1
  }
  const pump = MERGED[0] ?? NaN
  const vacuum = MERGED[1] ?? NaN
  const barometer = MERGED[3] ?? NaN
  const ambient = Number.isNaN(barometer) ? STANDARD_PRESSURE_PA : barometer
  const impossible = vacuumEntry !== -1 && vacuum > ambient
  if (impossible) {
    records.reason[vacuumEntry] = reasonCode('impossible')
    usable -= 1
  }
  if (usable === 0) return false
  const n = batch.count
  batch.at[n] = at
  batch.pumpOn[n] = Number.isNaN(pump) ? -1 : pump
  batch.vacuumPa[n] = impossible ? NaN : vacuum
  batch.airC[n] = MERGED[2] ?? NaN
  batch.barometerPa[n] = barometer
  batch.supplyV[n] = MERGED[4] ?? NaN
  batch.conflicting[n] = conflicting
  batch.count = n + 1
  return true
}

function refusals(records: RecordColumns): Pick<Checked, 'rejected' | 'rejectedRecords'> {
  const rejected: Checked['rejected'] = []
  let rejectedRecords = 0
  let last = -1
  for (let i = 0; i < records.count; i += 1) {
    const reason = REASONS[records.reason[i] ?? 0]
    const index = records.index[i] ?? 0
    // A row of a table is one record, however many of its cells are refused.
    if (reason === null || reason === undefined || index === last) continue
    last = index
    rejectedRecords += 1
    if (rejected.length < NAMED_REFUSALS) rejected.push({ index, reason })
  }
  return { rejected, rejectedRecords }
}

function emptyBatch(length: number): Batch {
  return {
    count: 0,
    at: new Float64Array(length),
    vacuumPa: new Float64Array(length),
    airC: new Float64Array(length),
    barometerPa: new Float64Array(length),
    supplyV: new Float64Array(length),
    pumpOn: new Int8Array(length),
    conflicting: new Uint8Array(length),
  }
}

function trimmed(batch: Batch): Batch {
  const { count } = batch
  return {
    count,
    at: batch.at.slice(0, count),
    vacuumPa: batch.vacuumPa.slice(0, count),
    airC: batch.airC.slice(0, count),
    barometerPa: batch.barometerPa.slice(0, count),
    supplyV: batch.supplyV.slice(0, count),
    pumpOn: batch.pumpOn.slice(0, count),
    conflicting: batch.conflicting.slice(0, count),
  }
}

/** First and last time of a batch that is not empty, epoch milliseconds. */
export const endsOf = ({ at, count }: Batch): { firstMs: number; lastMs: number } => ({
  firstMs: at[0] ?? 0,
  lastMs: at[count - 1] ?? 0,
})

/** The names (by position) that hold, between `:` or `/`, a word which may be a serial; the channel's word is not one. */
export function possibleSerials(names: readonly string[]): Map<string, number[]> {
  const found = new Map<string, number[]>()
  names.forEach((name, position) => {
    const words = name.split(/[:/]/)
    if (CHANNELS.some((channel) => channel === words.at(-1))) words.pop()
    for (const word of words) {
      if (word === '') continue
      const positions = found.get(word)
      if (positions === undefined) found.set(word, [position])
      else positions.push(position)
    }
  })
  return found
}
