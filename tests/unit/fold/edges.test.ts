import { describe, expect, it } from 'vitest'
import { currentOf, openRows } from '@/lib/analysis/fold'
import { foldStory, inHg, rowsOf, story } from './story'
import { FROM, HOUR } from './worlds'

const EACH_MINUTE = { intervalSeconds: 60 }

describe('edges by the pump channel', () => {
  it('takes a run from the first on-sample to the first off-sample, exact where the logger records edges', () => {
    const told = story(EACH_MINUTE).cycle(3, 2, 8, 10, 47)
    const { rows } = foldStory(told.hold(300, 2), EACH_MINUTE)
    const runs = rowsOf(rows, 'run')
    expect(runs).toHaveLength(3)
    const first = FROM + 0.9 * HOUR
    expect(runs[0]).toMatchObject({
      startedAt: first,
      stoppedAt: first + 47_000,
      trigger: 'leak',
      vacuumAtStartPa: inHg(8),
      vacuumAtStopPa: inHg(10),
      interrupted: false,
    })
    expect(runs[1]?.rechargePaPerSecond).toBeCloseTo(inHg(2) / 47, 1)
  })

  it('says how uncertain an edge between periodic samples is, and that one recorded at the edge is not', () => {
    const periodic = { intervalSeconds: 30, edges: false }
    const { rows } = foldStory(story(periodic).hold(100, 1).run(70, 10).hold(900, 1), periodic)
    expect(rowsOf(rows, 'run')[0]?.edgeUncertaintySeconds).toBe(30)
    const { rows: recorded } = foldStory(
      story(EACH_MINUTE).hold(100, 1).run(70, 10).hold(900, 1),
      EACH_MINUTE,
    )
    expect(rowsOf(recorded, 'run')[0]?.edgeUncertaintySeconds).toBe(1)
  })

  it('ends a hold with the trigger of the run that ended it, known when that run stops', () => {
    const { rows } = foldStory(story(EACH_MINUTE).cycle(1, 2).cycle(1, 2).hold(60, 2), EACH_MINUTE)
    const [fragment, hold] = rowsOf(rows, 'hold')
    expect(fragment).toMatchObject({ startedAt: FROM, ending: 'interrupted' })
    expect(hold).toMatchObject({ ending: 'leak', flushes: 0, cutOutPa: inHg(10), endPa: inHg(8) })
    const run = rowsOf(rows, 'run')[1]
    expect(hold?.endedAt).toBe(run?.startedAt)
    expect(hold?.knownAt).toBe(run?.stoppedAt)
  })

  it('shows what is open: the hold with its leg and rate, or the run', () => {
    const told = story(EACH_MINUTE).cycle(1, 2).hold(1800, 1.2)
    const { state } = foldStory(told, EACH_MINUTE)
    const open = openRows(state)
    expect(open.run).toBeNull()
    expect(open.hold).toMatchObject({ cutOutPa: inHg(10), flushes: 0 })
    expect(open.leg?.rate?.paPerHour).toBeCloseTo(inHg(1.2), -1)
    expect(open.leg?.rate?.compensated).toBe(false)
    expect(currentOf(state).holdSoFarSeconds).toBeGreaterThan(1700)
  })

  it('interrupts a hold by more than ten silent minutes and goes on with a piece of a hold', () => {
    const told = story(EACH_MINUTE).cycle(1, 2).hold(1200, 0.5).silence(660).hold(1200, 0.5)
    told.cycle(1, 2).hold(60, 0.5)
    const { rows, state } = foldStory(told, EACH_MINUTE)
    const endings = rowsOf(rows, 'hold').map((hold) => hold.ending)
    expect(endings).toEqual(['interrupted', 'interrupted', 'interrupted'])
    const [, cut, piece] = rowsOf(rows, 'hold')
    expect((cut?.knownAt ?? 0) - (cut?.endedAt ?? 0)).toBeGreaterThan(600_000)
    expect(piece?.startedAt).toBe(cut?.knownAt)
    expect(rowsOf(rows, 'leg').filter((leg) => leg.holdStartedAt === cut?.startedAt)).toHaveLength(1)
    expect(state.lastGap).toEqual({ from: cut?.endedAt, to: piece?.startedAt })
  })

  it('waits five intervals where they are longer than ten minutes', () => {
    const sparse = { intervalSeconds: 300 }
    const told = story(sparse)
      .cycle(1, 2)
      .hold(1500, 0.5)
      .silence(1100)
      .hold(1500, 0.5)
      .cycle(1, 2)
      .hold(60, 1)
    expect(rowsOf(foldStory(told, sparse).rows, 'hold').map((hold) => hold.ending)).toEqual([
      'interrupted',
      'leak',
    ])
  })

  it('ends a run by silence at its last sample, and says so', () => {
    const told = story(EACH_MINUTE).cycle(1, 2).hold(3600, 2)
    const { samples } = told.run(200, 9)
    const cut = samples.slice(0, -2)
    const back = story(EACH_MINUTE)
      .silence(6 * 3600)
      .setLevel(9.5)
      .hold(120, 1).samples
    const { rows } = foldStory({ samples: [...cut, ...back] }, EACH_MINUTE)
    const run = rowsOf(rows, 'run')[1]
    expect(run?.interrupted).toBe(true)
    expect(run?.stoppedAt).toBe(cut[cut.length - 1]?.at)
    expect(run?.rechargePaPerSecond).toBeNull()
  })

  it('infers a run that fell between two periodic samples of a logger without edge records', () => {
    const periodic = { intervalSeconds: 60, edges: false }
    const told = story(periodic).hold(1210, 0.6).drop(1.5).run(30, 10).hold(1800, 0.6)
    const runs = rowsOf(foldStory(told, periodic).rows, 'run')
    expect(runs).toEqual([])
    const lower = story(periodic).setLevel(8.1).hold(610, 0.6).run(40, 10).hold(1800, 0.6)
    const [run] = rowsOf(foldStory(lower, periodic).rows, 'run')
    expect(run).toMatchObject({ edgeUncertaintySeconds: 60, trigger: 'leak' })
  })
})

describe('edges by the vacuum alone', () => {
  const vacuumOnly = { intervalSeconds: 20, pump: false }

  it('takes a sustained rise for a run, between its turning points', () => {
    const told = story(vacuumOnly).cycle(4, 2).hold(600, 2)
    const { rows } = foldStory(told, vacuumOnly)
    const runs = rowsOf(rows, 'run')
    expect(runs).toHaveLength(4)
    const first = FROM + 0.9 * HOUR
    expect(Math.abs((runs[0]?.startedAt ?? 0) - first)).toBeLessThanOrEqual(20_000)
    expect(Math.abs((runs[0]?.stoppedAt ?? 0) - first - 60_000)).toBeLessThanOrEqual(20_000)
    expect(runs.every((run) => run.trigger === 'leak' && run.edgeUncertaintySeconds === 20)).toBe(true)
    expect(
      rowsOf(rows, 'hold')
        .slice(1)
        .every((hold) => hold.ending === 'leak'),
    ).toBe(true)
  })

  it('does not take the cooling of a night for a run', () => {
    const told = story(vacuumOnly)
      .cycle(1, 2)
      .hold(6 * 3600, -0.2)
    expect(rowsOf(foldStory(told, vacuumOnly).rows, 'run')).toHaveLength(1)
  })
})

describe('edges by the pump alone', () => {
  it('tells leak runs from flush runs by their length once enough were seen, and no ending', () => {
    const pumpOnly = { intervalSeconds: 60, vacuum: false }
    const told = story(pumpOnly)
    for (let i = 0; i < 20; i += 1) told.hold(3000, 0).run(i % 4 === 3 ? 110 + i : 60 + (i % 3) * 0.5, 10)
    const { rows } = foldStory(told.hold(60, 0), pumpOnly)
    const triggers = rowsOf(rows, 'run').map((run) => run.trigger)
    expect(triggers.slice(0, 8).every((trigger) => trigger === 'unknown')).toBe(true)
    expect(triggers.slice(12)).toEqual(['leak', 'leak', 'leak', 'flush', 'leak', 'leak', 'leak', 'flush'])
    const [fragment, ...holds] = rowsOf(rows, 'hold')
    expect(fragment?.ending).toBe('interrupted')
    expect(holds.every((hold) => hold.ending === 'unknown' && hold.learnedCutInPa === null)).toBe(true)
  })

  it('watches the runs alone of a system on demand', () => {
    const told = story(EACH_MINUTE).setLevel(0).hold(600, 0).run(30, 5).drop(5, 60).hold(600, 0).run(30, 5)
    const kind = { kind: 'on-demand' as const, cutOutPa: null, cutInPa: null }
    const { rows, state } = foldStory(told.hold(60, 0), EACH_MINUTE, [
      { kind: 'settings', at: FROM, settings: kind },
    ])
    expect(rows.map((row) => row.table).filter((table) => table !== 'flush')).toEqual(['run', 'run'])
    expect(rowsOf(rows, 'run')[0]?.trigger).toBe('flush')
    expect(openRows(state)).toEqual({ run: null, hold: null, leg: null })
  })
})
