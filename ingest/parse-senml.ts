import { CHANNELS, NO_CHANNEL, RecordColumns, reasonCode, roundTime, takeValue } from '@/ingest/records'
import { Problem } from '@/lib/problem'

/** RFC 8428 section 4.5.3: a time below this is relative to "now". */
const RELATIVE_BELOW_SECONDS = 2 ** 28
/** RFC 8428 section 4.4: the version spoken here. */
const VERSION = 10

/** Factors to Pa, °C and V by channel; hPa and kPa are secondary units in the manner of RFC 8798. */
const UNITS = new Map([
  ['vacuum Pa', 1],
  ['vacuum hPa', 100],
  ['vacuum kPa', 1000],
  ['air Cel', 1],
  ['barometer Pa', 1],
  ['barometer hPa', 100],
  ['supply V', 1],
])
/** RFC 8428 section 4.5.1. */
const NAME = /^[A-Za-z0-9][A-Za-z0-9\-:./_]*$/
const VALUE_FIELDS = ['v', 'vs', 'vb', 'vd'] as const

type Fields = Record<string, unknown>

/** What the base fields say from here on. */
interface Base {
  name: string
  time: number
  unit: string | undefined
  value: number | undefined
}

/**
 * Resolves a SenML pack (RFC 8428, JSON) into entries.
 * @param body the pack as text.
 * @param receiptMs epoch milliseconds of receipt: what relative times count from.
 * @throws Problem `not-parseable` with the place, when it is not a pack that may be understood.
 * @example parseSenml('[{"n":"x:vacuum","u":"kPa","v":30,"t":1700000000}]', 0).value[0] // 30000
 */
export function parseSenml(body: string, receiptMs: number): RecordColumns {
  const pack = readPack(body)
  const columns = new RecordColumns()
  const names = new Map<string, Name>()
  const base: Base = { name: '', time: 0, unit: undefined, value: undefined }
  for (let index = 0; index < pack.length; index += 1) {
    const record: unknown = pack[index]
    if (typeof record !== 'object' || record === null || Array.isArray(record))
      throw refused(index, 'is not an object')
    takeRecord(record as Fields, index, base, receiptMs, columns, names)
  }
  return columns
}

function readPack(body: string): unknown[] {
  let pack: unknown
  try {
    pack = JSON.parse(body)
  } catch (error) {
    const where = error instanceof Error ? error.message : 'unknown place'
    throw new Problem('not-parseable', `The body is not JSON: ${where}. Send one SenML pack (RFC 8428).`)
  }
  if (!Array.isArray(pack))
    throw new Problem(
      'not-parseable',
      'The body is JSON but not an array: a SenML pack is an array of records.',
    )
  return pack
}

const refused = (index: number, what: string): Problem =>
  new Problem('not-parseable', `Record ${index} (counted from 0) ${what}.`, { extensions: { index } })

function takeRecord(
  record: Fields,
  index: number,
  base: Base,
  receiptMs: number,
  columns: RecordColumns,
  names: Map<string, Name>,
): void {
  let own = false
  for (const key in record) {
    if (key.endsWith('_'))
      throw refused(index, `has the field "${key}", which must be understood and is not known here`)
    if (key === 'bn' || key === 'bt' || key === 'bu' || key === 'bv' || key === 'bver' || key === 'bs')
      continue
    own = true
  }
  takeBase(record, index, base)
  // A record of base fields alone sets the stage and measures nothing.
  if (!own) return

  const name = nameOf(record.n, base, names, columns)
  const seconds =
    record.t === undefined ? base.time : typeof record.t === 'number' ? base.time + record.t : NaN
  const relative = seconds < RELATIVE_BELOW_SECONDS
  const at = roundTime(seconds * 1000 + (relative ? receiptMs : 0))
  if (!Number.isFinite(at)) {
    columns.push(index, NaN, false, name.channel, NaN, reasonCode('bad-value'), name.position)
    return
  }
  const { value, reason } = valueOf(record, base, name)
  columns.push(index, at, relative, name.channel, value, reason, name.position)
}

function takeBase(record: Fields, index: number, base: Base): void {
  const { bn, bt, bu, bv, bver } = record
  if (bver !== undefined) {
    if (typeof bver !== 'number' || !Number.isInteger(bver) || bver < 1)
      throw refused(index, 'has a base version that is not a positive whole number')
    if (bver > VERSION)
      throw refused(index, `asks for SenML version ${bver}; version ${VERSION} is spoken here`)
  }
  if (bn !== undefined) {
    if (typeof bn !== 'string') throw refused(index, 'has a base name that is not text')
    base.name = bn
  }
  if (bt !== undefined) {
    if (typeof bt !== 'number' || !Number.isFinite(bt))
      throw refused(index, 'has a base time that is not a number')
    base.time = bt
  }
  if (bu !== undefined) {
    if (typeof bu !== 'string') throw refused(index, 'has a base unit that is not text')
    base.unit = bu
  }
  if (bv !== undefined) {
    if (typeof bv !== 'number' || !Number.isFinite(bv))
      throw refused(index, 'has a base value that is not a number')
    base.value = bv
  }
}

interface Name {
  channel: number
  position: number
  valid: boolean
}

/** Looks a resolved name up once; a pack of a million records has five of them. */
function nameOf(n: unknown, base: Base, names: Map<string, Name>, columns: RecordColumns): Name {
  const full = n === undefined ? base.name : typeof n === 'string' ? base.name + n : ''
  const known = names.get(full)
  if (known !== undefined) return known
  const last = full.slice(Math.max(full.lastIndexOf(':'), full.lastIndexOf('/')) + 1)
  const channel = CHANNELS.findIndex((word) => word === last)
  const name: Name = {
    channel: channel === -1 ? NO_CHANNEL : channel,
    position: columns.names.push(full) - 1,
    valid: NAME.test(full),
  }
  names.set(full, name)
  return name
}

function valueOf(record: Fields, base: Base, name: Name): { value: number; reason: number } {
  const bad = { value: NaN, reason: reasonCode('bad-value') }
  if (!name.valid)
    return name.channel === NO_CHANNEL ? { value: NaN, reason: reasonCode('unknown-channel') } : bad
  if (name.channel === NO_CHANNEL) return { value: NaN, reason: reasonCode('unknown-channel') }
  let given = 0
  for (const field of VALUE_FIELDS) if (record[field] !== undefined) given += 1
  if (given > 1) return bad
  if (name.channel === 0)
    return typeof record.vb === 'boolean' ? { value: record.vb ? 1 : 0, reason: 0 } : bad

  // Of v and bv a missing one counts as nought as long as the other is there (RFC 8428 section 4.1).
  const value =
    typeof record.v === 'number'
      ? record.v + (base.value ?? 0)
      : given === 0 && base.value !== undefined
        ? base.value
        : NaN
  if (Number.isNaN(value)) return bad
  const unit = record.u === undefined ? base.unit : record.u
  const factor = typeof unit === 'string' ? UNITS.get(`${CHANNELS[name.channel]} ${unit}`) : undefined
  if (factor === undefined) return { value: NaN, reason: reasonCode('unknown-unit') }
  return takeValue(name.channel, value * factor)
}
