import {
  CHANNELS,
  judgeValue,
  NO_CHANNEL,
  RecordColumns,
  reasonCode,
  roundChannel,
  roundTime,
  type Channel,
} from '@/ingest/records'
import { Problem } from '@/lib/problem'

/** RFC 8428 section 4.5.3: a time below this is relative to "now". */
const RELATIVE_BELOW_SECONDS = 2 ** 28
/** RFC 8428 section 4.4: the version spoken here. */
const VERSION = 10

/** By channel, factors to Pa, °C and V; hPa and kPa are secondary units in the manner of RFC 8798. */
const UNITS: Record<Channel, ReadonlyMap<unknown, number>> = {
  pump: new Map(),
  vacuum: new Map([
    ['Pa', 1],
    ['hPa', 100],
    ['kPa', 1000],
  ]),
  air: new Map([['Cel', 1]]),
  barometer: new Map([
    ['Pa', 1],
    ['hPa', 100],
  ]),
  supply: new Map([['V', 1]]),
}
/** RFC 8428 section 4.5.1. */
const NAME = /^[A-Za-z0-9][A-Za-z0-9\-:./_]*$/

/** The fields of one record that are understood here; undefined = not there. */
export interface SenmlFields {
  bn: unknown
  bt: unknown
  bu: unknown
  bv: unknown
  bver: unknown
  n: unknown
  u: unknown
  v: unknown
  vs: unknown
  vb: unknown
  vd: unknown
  t: unknown
}

interface Name {
  channel: number
  position: number
  valid: boolean
  units: ReadonlyMap<unknown, number>
}

const refused = (index: number, what: string): Problem =>
  new Problem('not-parseable', `Record ${index} (counted from 0) ${what}.`, { extensions: { index } })

/**
 * Resolves the records of a pack one after the other (RFC 8428 section 4.6): what the base fields said before
 * counts for those that follow. The entries end in `columns`.
 */
export class SenmlResolver {
  readonly columns = new RecordColumns()
  private readonly names = new Map<string, Name>()
  private reason = 0
  private baseName = ''
  private baseTime = 0
  private baseUnit: string | undefined
  private baseValue: number | undefined

  /** @param receiptMs epoch milliseconds of receipt: what relative times count from. */
  constructor(private readonly receiptMs: number) {}

  /**
   * @param own whether the record has any field besides base fields: one without sets the stage and measures nothing.
   * @throws Problem `not-parseable` when the record's base fields cannot be understood.
   */
  take(record: SenmlFields, index: number, own: boolean): void {
    this.takeBase(record, index)
    if (!own) return
    const { columns } = this
    const name = this.nameOf(record.n)
    const seconds =
      record.t === undefined ? this.baseTime : typeof record.t === 'number' ? this.baseTime + record.t : NaN
    const relative = seconds < RELATIVE_BELOW_SECONDS
    const at = roundTime(seconds * 1000 + (relative ? this.receiptMs : 0))
    if (!Number.isFinite(at)) {
      columns.push(index, NaN, false, name.channel, NaN, reasonCode('bad-value'), name.position)
      return
    }
    const value = this.valueOf(record, name)
    columns.push(index, at, relative, name.channel, value, this.reason, name.position)
  }

  private takeBase({ bn, bt, bu, bv, bver }: SenmlFields, index: number): void {
    if (bver !== undefined) {
      if (typeof bver !== 'number' || !Number.isInteger(bver) || bver < 1)
        throw refused(index, 'has a base version that is not a positive whole number')
      if (bver > VERSION)
        throw refused(index, `asks for SenML version ${bver}; version ${VERSION} is spoken here`)
    }
    if (bn !== undefined) {
      if (typeof bn !== 'string') throw refused(index, 'has a base name that is not text')
      this.baseName = bn
    }
    if (bt !== undefined) {
      if (typeof bt !== 'number' || !Number.isFinite(bt))
        throw refused(index, 'has a base time that is not a number')
      this.baseTime = bt
    }
    if (bu !== undefined) {
      if (typeof bu !== 'string') throw refused(index, 'has a base unit that is not text')
      this.baseUnit = bu
    }
    if (bv !== undefined) {
      if (typeof bv !== 'number' || !Number.isFinite(bv))
        throw refused(index, 'has a base value that is not a number')
      this.baseValue = bv
    }
  }

  /** Looks a resolved name up once; a pack of a million records has five of them. */
  private nameOf(n: unknown): Name {
    const full = n === undefined ? this.baseName : typeof n === 'string' ? this.baseName + n : ''
    const known = this.names.get(full)
    if (known !== undefined) return known
    const last = full.slice(Math.max(full.lastIndexOf(':'), full.lastIndexOf('/')) + 1)
    const channel = CHANNELS.findIndex((word) => word === last)
    const name: Name = {
      channel: channel === -1 ? NO_CHANNEL : channel,
      position: this.columns.names.push(full) - 1,
      valid: NAME.test(full),
      units: UNITS[CHANNELS[channel] ?? 'pump'],
    }
    this.names.set(full, name)
    return name
  }

  /** The record's value in our units, rounded; what speaks against it is left in `reason`. */
  private valueOf({ u, v, vs, vb, vd }: SenmlFields, name: Name): number {
    this.reason = 0
    if (name.channel === NO_CHANNEL) return this.refuse(UNKNOWN_CHANNEL)
    const given =
      Number(v !== undefined) + Number(vs !== undefined) + Number(vb !== undefined) + Number(vd !== undefined)
    if (!name.valid || given > 1) return this.refuse(BAD_VALUE)
    if (name.channel === 0) return typeof vb === 'boolean' ? Number(vb) : this.refuse(BAD_VALUE)

    // Of v and bv a missing one counts as nought as long as the other is there (RFC 8428 section 4.1).
    const base = this.baseValue
    const value = typeof v === 'number' ? v + (base ?? 0) : given === 0 && base !== undefined ? base : NaN
    if (!Number.isFinite(value)) return this.refuse(BAD_VALUE)
    const factor = name.units.get(u === undefined ? this.baseUnit : u)
    if (factor === undefined) return this.refuse(UNKNOWN_UNIT)
    const rounded = roundChannel(name.channel, value * factor)
    this.reason = judgeValue(name.channel, rounded)
    return rounded
  }

  private refuse(reason: number): number {
    this.reason = reason
    return NaN
  }
}

const UNKNOWN_CHANNEL = reasonCode('unknown-channel')
const UNKNOWN_UNIT = reasonCode('unknown-unit')
const BAD_VALUE = reasonCode('bad-value')
