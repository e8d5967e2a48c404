import {
  figuresInput,
  figuresOf,
  type Figures,
  type FiguresInput,
  type FiguresSettings,
} from '@/lib/analysis/figures'
import { initialState, step, type FoldItem, type FoldState, type Row } from '@/lib/analysis/fold'
import { PA_PER_INHG } from '@/shared/units'
import type { BoatSpec, SimSample } from '@/simulator/boat'

/** An installer reads the switch's points off a gauge in tenths of an inch. */
const asSet = (pa: number): number => Math.round((10 * pa) / PA_PER_INHG) * (PA_PER_INHG / 10)

export interface RecordedBoat {
  state: FoldState
  rows: {
    runs: Extract<Row, { table: 'run' }>['row'][]
    holds: Extract<Row, { table: 'hold' }>['row'][]
    legs: Extract<Row, { table: 'leg' }>['row'][]
    flushes: Extract<Row, { table: 'flush' }>['row'][]
  }
}

/** A boat's record so far; `take` folds more samples into it. */
export function recordOf(spec: BoatSpec, from: number) {
  const boat: RecordedBoat = { state: initialState(), rows: { runs: [], holds: [], legs: [], flushes: [] } }
  const put = (item: FoldItem): void => {
    for (const row of step(boat.state, item)) {
      if (row.table === 'run') boat.rows.runs.push(row.row)
      if (row.table === 'hold') boat.rows.holds.push(row.row)
      if (row.table === 'leg') boat.rows.legs.push(row.row)
      if (row.table === 'flush') boat.rows.flushes.push(row.row)
    }
  }
  const settings = settingsOf(spec)
  const { kind, cutOutPa, cutInPa, channels, intervalSeconds } = settings
  put({ type: 'fact', fact: { kind: 'settings', at: from, settings: { kind, cutOutPa, cutInPa } } })
  const interval = intervalSeconds ?? 60
  put({
    type: 'fact',
    fact: { kind: 'fitting', at: from, loggerId: '1', intervalSeconds: interval, channels },
  })
  const take = (samples: readonly SimSample[]): void => {
    for (const sample of samples) put({ type: 'sample', sample: { ...sample, at: Math.round(sample.at) } })
  }
  return { boat, take }
}

export function settingsOf(spec: BoatSpec): FiguresSettings {
  const { channels, intervalSeconds } = spec.logger
  return {
    kind: 'pass-through',
    cutOutPa: asSet(spec.switch.cutOutPa),
    cutInPa: asSet(spec.switch.cutInPa),
    limitSeconds: 10_800,
    aimSeconds: 28_800,
    silenceSeconds: 21_600,
    pumpAmps: null,
    altitudeM: 0,
    channels: { pump: channels.includes('pump'), vacuum: channels.includes('vacuum') },
    intervalSeconds,
  }
}

export function inputAt(spec: BoatSpec, { state, rows }: RecordedBoat, at: number): FiguresInput {
  return figuresInput(state, { at, rows, settings: settingsOf(spec), lastHeardAt: at })
}

export const figuresAt = (spec: BoatSpec, boat: RecordedBoat, at: number): Figures =>
  figuresOf(inputAt(spec, boat, at))
