/** What an upload says, record by record, before records of one time become a sample. */

export const CHANNELS = ['pump', 'vacuum', 'air', 'barometer', 'supply'] as const
export type Channel = (typeof CHANNELS)[number]

/** Why a record was not taken, in the words of the answer. Position 0 stands for "taken". */
export const REASONS = [
  null,
  'future',
  'too-old',
  'impossible',
  'unknown-channel',
  'unknown-unit',
  'bad-value',
  'other-logger',
] as const
export type Reason = Exclude<(typeof REASONS)[number], null>
export const reasonCode = (reason: Reason): number => REASONS.indexOf(reason)

export const NO_NAME = 0xffff_ffff
/** `channel` of an entry that belongs to none of the five. */
export const NO_CHANNEL = 255

/**
 * Growing parallel columns, one entry a channel's value (or a refusal). A record of SenML is one entry; a row of
 * CSV is one entry a filled cell. A backlog of weeks is a million entries: objects would cost ten times the memory.
 */
export class RecordColumns {
  count = 0
  /** Record or data row, counted from 0, in the order of the upload. */
  index = new Uint32Array(1024)
  /** Epoch milliseconds as the upload says, not yet shifted; NaN where the time could not be read. */
  at = new Float64Array(1024)
  /** 1 where the time was given relative to receipt: our clock, so never shifted. */
  relative = new Uint8Array(1024)
  /** Position in CHANNELS, or NO_CHANNEL. */
  channel = new Uint8Array(1024)
  /** Pa, °C or V; pump 1 or 0. */
  value = new Float64Array(1024)
  /** Position in REASONS; 0 = nothing against it so far. */
  reason = new Uint8Array(1024)
  /** Position in `names`, or NO_NAME. */
  name = new Uint32Array(1024)
  /** The distinct resolved names of the upload. */
  readonly names: string[] = []

  push(
    index: number,
    at: number,
    relative: boolean,
    channel: number,
    value: number,
    reason: number,
    name = NO_NAME,
  ): void {
    const position = this.count
    if (position === this.index.length) this.grow()
    this.index[position] = index
    this.at[position] = at
    this.relative[position] = relative ? 1 : 0
    this.channel[position] = channel
    this.value[position] = value
    this.reason[position] = reason
    this.name[position] = name
    this.count = position + 1
  }

  private grow(): void {
    const length = this.index.length * 2
    const widen = <T extends Uint32Array | Float64Array | Uint8Array>(old: T, wide: T): T => {
      wide.set(old)
      return wide
    }
    this.index = widen(this.index, new Uint32Array(length))
    this.at = widen(this.at, new Float64Array(length))
    this.relative = widen(this.relative, new Uint8Array(length))
    this.channel = widen(this.channel, new Uint8Array(length))
    this.value = widen(this.value, new Float64Array(length))
    this.reason = widen(this.reason, new Uint8Array(length))
    this.name = widen(this.name, new Uint32Array(length))
  }
}

/** Rounding on receipt, judged by before anything is compared: pressure to 0.1 Pa, the rest to 0.01. */
export function roundChannel(channel: number, value: number): number {
  // Adding nought turns -0 into 0, which would otherwise be another byte in the database.
  if (channel === 1 || channel === 3) return Math.round(value * 10) / 10 + 0
  return Math.round(value * 100) / 100 + 0
}

/** Time is rounded to the millisecond. */
export const roundTime = (ms: number): number => Math.round(ms)

const RANGES: readonly (readonly [number, number])[] = [
  [0, 1],
  [-20_000, Infinity],
  [-40, 85],
  [50_000, 110_000],
  [0, 60],
]

/** What speaks against a rounded value by what its channel can show at all (0 = nothing); ambient is looked at later. */
export function judgeValue(channel: number, rounded: number): number {
  if (!Number.isFinite(rounded)) return BAD_VALUE
  const range = RANGES[channel]
  return range !== undefined && (rounded < range[0] || rounded > range[1]) ? IMPOSSIBLE : 0
}
const BAD_VALUE = reasonCode('bad-value')
const IMPOSSIBLE = reasonCode('impossible')

/** Rounds a value and judges it. `takeValue(2, 85.004) // { value: 85, reason: 0 }` */
export function takeValue(channel: number, value: number): { value: number; reason: number } {
  const rounded = roundChannel(channel, value)
  return { value: rounded, reason: judgeValue(channel, rounded) }
}
