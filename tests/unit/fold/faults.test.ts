import { describe, expect, it } from 'vitest'
import { conditionOf, type Sample } from '@/lib/analysis/fold'
import { foldStory, inHg, rowsOf, story } from './story'
import { HOUR } from './worlds'

const EACH_MINUTE = { intervalSeconds: 60 }

/** Changes the vacuum of the samples between two instants. */
function spoil(
  samples: readonly Sample[],
  from: number,
  to: number,
  change: (pa: number) => number,
): Sample[] {
  return samples.map((sample) =>
    sample.at >= from && sample.at < to && sample.vacuumPa !== null
      ? { ...sample, vacuumPa: change(sample.vacuumPa) }
      : sample,
  )
}

describe('sensor faults', () => {
  it('names a sensor stuck when two runs did not move it, and takes no rates from it', () => {
    const told = story(EACH_MINUTE).cycle(3, 2, 8, 10, 47)
    const from = told.now()
    told.cycle(6, 2, 8, 10, 47)
    const until = told.now()
    told.cycle(3, 2, 8, 10, 47).hold(60, 1)
    const { rows } = foldStory({ samples: spoil(told.samples, from, until, () => inHg(9)) }, EACH_MINUTE)
    const faults = rowsOf(rows, 'fault')
    expect(faults).toHaveLength(1)
    expect(faults[0]).toMatchObject({ kind: 'stuck' })
    expect(faults[0]?.startedAt).toBeGreaterThanOrEqual(from)
    expect(faults[0]?.endedAt).toBeGreaterThanOrEqual(until)
    expect(rowsOf(rows, 'run')).toHaveLength(12)
    const during = rowsOf(rows, 'leg').filter((leg) => leg.startedAt > from + 3 * HOUR && leg.endedAt < until)
    expect(during).toEqual([])
  })

  it.each([
    ['off-scale' as const, (): number => inHg(29)],
    ['swapped-sign' as const, (pa: number): number => -pa / 2],
  ])('names %s readings and keeps the runs', (kind, change) => {
    const told = story(EACH_MINUTE).cycle(3, 2, 8, 10, 47)
    const from = told.now()
    told.cycle(3, 2, 8, 10, 47)
    const until = told.now()
    told.cycle(3, 2, 8, 10, 47).hold(60, 1)
    const half = foldStory(
      { samples: spoil(told.samples, from, until, change).filter((s) => s.at < until) },
      EACH_MINUTE,
    )
    expect(conditionOf(half.state).fault).toMatchObject({ kind })
    const { rows, state } = foldStory({ samples: spoil(told.samples, from, until, change) }, EACH_MINUTE)
    expect(rowsOf(rows, 'fault').map((fault) => fault.kind)).toEqual([kind])
    expect(conditionOf(state).fault).toBeNull()
    expect(rowsOf(rows, 'run')).toHaveLength(9)
    expect(rowsOf(rows, 'flush')).toEqual([])
    for (const leg of rowsOf(rows, 'leg')) {
      for (const pa of leg.bins.vacuumPa) expect(pa).toBeGreaterThan(inHg(7))
      for (const pa of leg.bins.vacuumPa) expect(pa).toBeLessThan(inHg(11))
    }
  })

  it('names a zero that has drifted when a system at rest reads vacuum for hours', () => {
    const told = story(EACH_MINUTE)
      .cycle(6, 2, 8, 10, 47)
      .hold(3600, 2)
      .drop(7.5, 60)
      .hold(8 * 3600, 0)
    const { state } = foldStory(told, EACH_MINUTE)
    expect(conditionOf(state).fault).toMatchObject({ kind: 'zero-drift' })
    const { rows } = foldStory(told.run(200, 10).hold(600, 2), EACH_MINUTE)
    expect(rowsOf(rows, 'fault').map((fault) => fault.kind)).toEqual(['zero-drift'])
  })

  it('finds no fault in a vented system that reads nought', () => {
    const told = story(EACH_MINUTE)
      .cycle(6, 2, 8, 10, 47)
      .hold(3600, 2)
      .drop(8, 60)
      .setLevel(0)
      .hold(90 * 3600, 0)
    const { rows, state } = foldStory(told, EACH_MINUTE)
    expect(rowsOf(rows, 'fault')).toEqual([])
    expect(conditionOf(state).fault).toBeNull()
  })
})
