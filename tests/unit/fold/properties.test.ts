import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import {
  checkpointDue,
  currentOf,
  conditionOf,
  initialState,
  learned,
  openRows,
  parseState,
  serialiseState,
  step,
  type FoldItem,
  type Row,
} from '@/lib/analysis/fold'
import { anyItems, boatItems, foldAll, wildItems } from './worlds'
import { times } from '@/tests/support/long'

const RUNS = { numRuns: times(50) }

/** What a document store does: another order of keys, the same values. */
function reversedKeys(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(reversedKeys)
  if (value === null || typeof value !== 'object') return value
  const entries = Object.entries(value).reverse()
  return Object.fromEntries(entries.map(([key, inner]) => [key, reversedKeys(inner)]))
}

const startOf = (row: Row): number => (row.table === 'flush' ? row.row.at : row.row.startedAt)
const endOf = (row: Row): number =>
  row.table === 'flush' ? row.row.at : row.table === 'run' ? row.row.stoppedAt : row.row.endedAt

describe('the fold', () => {
  it('gives the same rows and the same state however the stream is cut into batches', () => {
    fc.assert(
      fc.property(anyItems, fc.array(fc.double({ min: 0, max: 1, noNaN: true })), (items, cuts) => {
        const whole = initialState()
        const rows = foldAll(items, whole)
        const places = new Set(cuts.map((cut) => Math.floor(cut * items.length)))
        let state = initialState()
        const batched: Row[] = []
        items.forEach((item, i) => {
          if (places.has(i)) {
            const stored: unknown = JSON.parse(serialiseState(state))
            state = parseState(JSON.stringify(reversedKeys(stored)))
          }
          batched.push(...step(state, item))
        })
        expect(batched).toEqual(rows)
        expect(serialiseState(state)).toBe(serialiseState(whole))
      }),
      RUNS,
    )
  })

  it('never looks ahead: rows known up to a moment do not depend on later items', () => {
    fc.assert(
      fc.property(anyItems, fc.double({ min: 0, max: 1, noNaN: true }), (items, share) => {
        const size = Math.floor(share * items.length)
        const prefix = items.slice(0, size)
        const last = prefix[size - 1]
        const until = last === undefined ? -Infinity : timeOf(last)
        const rest = items.slice(size)
        fc.pre(rest[0] === undefined || timeOf(rest[0]) > until)
        const known = foldAll(items).filter((row) => row.row.knownAt <= until)
        expect(foldAll(prefix)).toEqual(known)
      }),
      RUNS,
    )
  })

  it('stamps each row with the time of the item that settled it, never before the row ends', () => {
    fc.assert(
      fc.property(anyItems, (items) => {
        const state = initialState()
        for (const item of items) {
          for (const row of step(state, item)) {
            expect(row.row.knownAt).toBe(timeOf(item))
            expect(endOf(row)).toBeLessThanOrEqual(row.row.knownAt)
            expect(startOf(row)).toBeLessThanOrEqual(endOf(row))
          }
        }
      }),
      RUNS,
    )
  })

  it('never lets two holds or runs overlap, and lets them take turns where no data is missing', () => {
    fc.assert(
      fc.property(anyItems, (items) => {
        const spans = foldAll(items)
          .filter((row) => row.table === 'run' || row.table === 'hold')
          .sort((a, b) => startOf(a) - startOf(b) || endOf(a) - endOf(b))
        spans.forEach((row, i) => {
          const before = spans[i - 1]
          if (before === undefined) return
          expect(startOf(row)).toBeGreaterThanOrEqual(endOf(before))
          const interrupted =
            before.table === 'hold'
              ? before.row.ending === 'interrupted'
              : before.table === 'run' && before.row.interrupted
          if (!interrupted && startOf(row) === endOf(before)) expect(row.table).not.toBe(before.table)
        })
      }),
      RUNS,
    )
  })

  it('gives every row a key of its own', () => {
    fc.assert(
      fc.property(anyItems, (items) => {
        const keys = foldAll(items).map((row) =>
          row.table === 'fault'
            ? `fault ${row.row.kind} ${row.row.startedAt}`
            : `${row.table} ${startOf(row)}`,
        )
        expect(new Set(keys).size).toBe(keys.length)
      }),
      RUNS,
    )
  })

  it('keeps legs inside their hold and under 121 bins', () => {
    fc.assert(
      fc.property(boatItems, (items) => {
        const rows = foldAll(items)
        const holds = new Map(
          rows.flatMap((row) => (row.table === 'hold' ? [[row.row.startedAt, row.row]] : [])),
        )
        for (const row of rows) {
          if (row.table !== 'leg') continue
          const { bins } = row.row
          expect(bins.count.length).toBeLessThanOrEqual(120)
          for (const column of [
            bins.offsetSeconds,
            bins.vacuumPa,
            bins.airC,
            ...bins.laggedAirC,
            bins.barometerPa,
          ]) {
            expect(column).toHaveLength(bins.count.length)
          }
          const hold = holds.get(row.row.holdStartedAt)
          if (hold === undefined) continue
          expect(row.row.startedAt).toBeGreaterThanOrEqual(hold.startedAt)
          expect(row.row.endedAt).toBeLessThanOrEqual(hold.endedAt)
        }
      }),
      RUNS,
    )
  })

  it('stays under 8 kB of state and answers every question at every moment', () => {
    fc.assert(
      fc.property(anyItems, (items) => {
        const state = initialState()
        items.forEach((item, i) => {
          step(state, item)
          if (i % 37 !== 0) return
          const text = serialiseState(state)
          expect(text.length).toBeLessThanOrEqual(8192)
          openRows(state)
          currentOf(state)
          conditionOf(state)
          learned(state)
          expect(serialiseState(state)).toBe(text)
        })
      }),
      RUNS,
    )
  })

  it('goes on from any checkpoint to the same rows and the same state', () => {
    fc.assert(
      fc.property(boatItems, (items) => {
        const state = initialState()
        const rows: Row[] = []
        const kept: { index: number; text: string; rows: number }[] = []
        items.forEach((item, index) => {
          rows.push(...step(state, item))
          if (checkpointDue(state)) kept.push({ index, text: serialiseState(state), rows: rows.length })
        })
        for (const checkpoint of kept) {
          const resumed = parseState(checkpoint.text)
          expect(foldAll(items.slice(checkpoint.index + 1), resumed)).toEqual(rows.slice(checkpoint.rows))
          expect(serialiseState(resumed)).toBe(serialiseState(state))
        }
      }),
      { numRuns: times(20) },
    )
  })

  it('takes any samples without an error', () => {
    fc.assert(
      fc.property(wildItems, (items) => {
        expect(() => foldAll(items)).not.toThrow()
      }),
      { numRuns: times(200) },
    )
  })
})

function timeOf(item: FoldItem): number {
  return item.type === 'fact' ? item.fact.at : item.sample.at
}
