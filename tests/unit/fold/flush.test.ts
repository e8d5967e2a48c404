import { describe, expect, it } from 'vitest'
import { foldStory, inHg, rowsOf, story } from './story'
import { FROM } from './worlds'

const EACH_MINUTE = { intervalSeconds: 60 }
const EACH_5_S = { intervalSeconds: 5 }

describe('flushes', () => {
  it('splits the hold into legs where a flush does not start the pump', () => {
    const told = story(EACH_MINUTE)
      .cycle(1, 2)
      .hold(1800, 0.3)
      .drop(0.9)
      .hold(1800, 0.3)
      .cycle(1, 2)
      .hold(60, 1)
    const { rows } = foldStory(told, EACH_MINUTE)
    const [flush] = rowsOf(rows, 'flush')
    expect(flush).toMatchObject({ startedPump: false })
    expect(flush?.dropPa).toBeCloseTo(inHg(0.9), -2)
    const hold = rowsOf(rows, 'hold')[1]
    expect(hold).toMatchObject({ flushes: 1, ending: 'leak' })
    const legs = rowsOf(rows, 'leg').filter((leg) => leg.holdStartedAt === hold?.startedAt)
    expect(legs).toHaveLength(2)
    expect(legs[0]?.endedAt).toBeLessThan(flush?.at ?? 0)
    expect(legs[1]?.startedAt).toBeGreaterThanOrEqual((flush?.at ?? 0) + 60_000)
    expect(legs[1]?.sinceFlushSeconds).toBeGreaterThanOrEqual(60)
  })

  it('gives the flush that started a run with its run', () => {
    const told = story(EACH_MINUTE).cycle(6, 3, 8, 10, 47).hold(1210, 0.3).drop(2.1, 1.5).drop(1.5, 1)
    const { rows } = foldStory(told.run(100, 10).hold(120, 0.3), EACH_MINUTE)
    const run = rowsOf(rows, 'run')[6]
    expect(run?.trigger).toBe('flush')
    const [flush] = rowsOf(rows, 'flush')
    expect(flush).toMatchObject({ at: run?.startedAt, startedPump: true })
    expect(rowsOf(rows, 'hold').map((hold) => hold.ending)).toEqual([
      'interrupted',
      'leak',
      'leak',
      'leak',
      'leak',
      'leak',
      'flush',
    ])
  })

  it('tells a flush during a leak run from one that started it', () => {
    const told = story(EACH_5_S).cycle(6, 3).hold(2399, 3)
    const { rows } = foldStory(told.runWithFlush(20, 8.7, 1.5, 80, 10).hold(120, 3), EACH_5_S)
    const [run] = rowsOf(rows, 'run').slice(-1)
    expect(run).toMatchObject({ trigger: 'leak' })
    expect((run?.stoppedAt ?? 0) - (run?.startedAt ?? 0)).toBe(102_000)
    const flushes = rowsOf(rows, 'flush')
    expect(flushes).toHaveLength(1)
    expect(flushes[0]).toMatchObject({ startedPump: false })
    // Sampled every 5 s, a part of the fall is already restored when it is seen.
    expect(flushes[0]?.dropPa).toBeGreaterThan(inHg(1))
    expect(flushes[0]?.dropPa).toBeLessThanOrEqual(inHg(1.55))
  })

  it('splits legs at a tap and does not count it', () => {
    const told = story(EACH_5_S)
      .cycle(1, 2)
      .hold(1800, 0.3)
      .drop(0.25)
      .hold(1800, 0.3)
      .cycle(1, 2)
      .hold(60, 1)
    const { rows } = foldStory(told, EACH_5_S)
    expect(rowsOf(rows, 'flush')).toEqual([])
    const hold = rowsOf(rows, 'hold')[1]
    expect(hold?.flushes).toBe(0)
    expect(rowsOf(rows, 'leg').filter((leg) => leg.holdStartedAt === hold?.startedAt)).toHaveLength(2)
  })

  it('does not take the steps of a coarse gauge for taps or flushes', () => {
    const coarse = { intervalSeconds: 60, stepInHg: 0.25 }
    const { rows } = foldStory(story(coarse).cycle(6, 0.6).hold(60, 1), coarse)
    expect(rowsOf(rows, 'flush')).toEqual([])
    expect(rowsOf(rows, 'leg')).toHaveLength(6)
    expect(rowsOf(rows, 'run').every((run) => run.trigger === 'leak')).toBe(true)
  })

  it('does not take a fast leak for flushes once it knows the leak', () => {
    const told = story(EACH_MINUTE).cycle(20, 20, 8, 10, 47).hold(60, 20)
    const { rows } = foldStory(told, EACH_MINUTE)
    expect(rowsOf(rows, 'flush')).toEqual([])
    expect(rowsOf(rows, 'run').every((run) => run.trigger === 'leak')).toBe(true)
  })

  it('names a fall that came back by itself a jump, and leaves it out of the leg', () => {
    const told = story(EACH_MINUTE).cycle(1, 2, 8, 10, 47).hold(1800, 0.3)
    const clean = foldStory(
      story(EACH_MINUTE).cycle(1, 2, 8, 10, 47).hold(3600, 0.3).cycle(1, 2),
      EACH_MINUTE,
    )
    const level = told.level()
    told
      .setLevel(level - 3)
      .hold(60, 0)
      .setLevel(level)
      .hold(1740, 0.3)
      .cycle(1, 2)
    const { rows } = foldStory(told, EACH_MINUTE)
    expect(rowsOf(rows, 'flush')).toEqual([])
    expect(rowsOf(rows, 'fault')).toMatchObject([{ kind: 'jump' }])
    const rate = rowsOf(rows, 'leg')[1]?.rate?.paPerHour ?? 0
    expect(rate).toBeCloseTo(rowsOf(clean.rows, 'leg')[1]?.rate?.paPerHour ?? 0, -2)
  })

  it('calls the drawing down of a vented system a startup', () => {
    const told = story({ ...EACH_MINUTE, startInHg: 0 })
      .hold(300, 0)
      .run(300, 10)
      .hold(600, 0.5)
    const { rows } = foldStory(told, EACH_MINUTE)
    expect(rowsOf(rows, 'run')[0]).toMatchObject({ trigger: 'startup', startedAt: FROM + 300_000 })
  })
})
