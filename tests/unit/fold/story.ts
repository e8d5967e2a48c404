import {
  initialState,
  orderItems,
  type Fact,
  type FaultRow,
  type FlushRow,
  type FoldState,
  type HoldRow,
  type LegRow,
  type Row,
  type RunRow,
  type Sample,
} from '@/lib/analysis/fold'
import { PA_PER_INHG } from '@/shared/units'
import { fitting, foldAll, FROM, sampleAt } from './worlds'

export const inHg = (value: number): number => Math.round(value * PA_PER_INHG * 10) / 10

interface RowOf {
  run: RunRow
  hold: HoldRow
  leg: LegRow
  flush: FlushRow
  fault: FaultRow
}

/** Rows of one table, in order. */
export function rowsOf<Table extends Row['table']>(rows: readonly Row[], table: Table): RowOf[Table][] {
  const found: RowOf[Table][] = []
  for (const row of rows) if (isOf(row, table)) found.push(row.row)
  return found
}

const isOf = <Table extends Row['table']>(
  row: Row,
  table: Table,
): row is Row & { table: Table; row: RowOf[Table] } => row.table === table

export interface StoryOptions {
  intervalSeconds: number
  /** Records at the pump's edges besides the rhythm. */
  edges?: boolean
  pump?: boolean
  vacuum?: boolean
  startInHg?: number
  weather?: { airC: number; barometerPa: number }
  /** Step of the gauge. */
  stepInHg?: number
}

/**
 * A boat told stretch by stretch, exact and without noise: what the logger would have recorded. Vacuum moves
 * in straight lines; samples come each interval from the start of the story on.
 */
export function story(options: StoryOptions) {
  const { intervalSeconds, edges = true, pump = true, vacuum = true, startInHg = 9.8, stepInHg = 0 } = options
  const samples: Sample[] = []
  let at = FROM
  let next = FROM
  let level = startInHg
  let on = false
  const record = (time: number, value: number): void => {
    const shown = stepInHg > 0 ? Math.round(value / stepInHg) * stepInHg : value
    if (samples[samples.length - 1]?.at === time) samples.pop()
    samples.push(
      sampleAt(time, {
        vacuumPa: vacuum ? inHg(shown) : null,
        pumpOn: pump ? on : null,
        airC: options.weather?.airC ?? null,
        barometerPa: options.weather?.barometerPa ?? null,
      }),
    )
  }
  /** Moves in a straight line to a level. */
  const move = (seconds: number, to: number): void => {
    const end = at + seconds * 1000
    const from = level
    while (next < end) {
      record(next, from + ((to - from) * (next - at)) / (end - at))
      next += intervalSeconds * 1000
    }
    at = end
    level = to
  }
  const edge = (): void => {
    if (pump && edges) record(at, level)
  }
  return {
    samples,
    now: () => at,
    level: () => level,
    hold(seconds: number, inHgPerHour: number) {
      move(seconds, level - (inHgPerHour * seconds) / 3600)
      return this
    },
    drop(drop: number, seconds = 2) {
      move(seconds, level - drop)
      return this
    },
    run(seconds: number, to: number) {
      on = true
      edge()
      move(seconds, to)
      on = false
      edge()
      return this
    },
    /** A run with a flush in it: rises, falls by `drop` within two seconds, rises again. */
    runWithFlush(seconds: number, to: number, drop: number, secondsAfter: number, cutOut: number) {
      on = true
      edge()
      move(seconds, to)
      move(2, level - drop)
      move(secondsAfter, cutOut)
      on = false
      edge()
      return this
    },
    /** Leaks to the cut-in and recharges, so many times. */
    cycle(times: number, inHgPerHour: number, cutIn = 8, cutOut = 10, rechargeSeconds = 60) {
      for (let i = 0; i < times; i += 1) {
        this.hold(((level - cutIn) / inHgPerHour) * 3600, inHgPerHour).run(rechargeSeconds, cutOut)
      }
      return this
    },
    silence(seconds: number) {
      at += seconds * 1000
      next = at
      return this
    },
    setLevel(to: number) {
      level = to
      return this
    },
  }
}

export type Story = ReturnType<typeof story>

/** Folds a story with its logger's fitting (and further facts). */
export function foldStory(
  told: Pick<Story, 'samples'>,
  options: StoryOptions,
  facts: readonly Fact[] = [],
): { rows: Row[]; state: FoldState } {
  const state = initialState()
  const fitted = fitting(FROM, options.intervalSeconds, options.pump ?? true, options.vacuum ?? true)
  const rows = foldAll(orderItems([fitted, ...facts], told.samples), state)
  return { rows, state }
}
