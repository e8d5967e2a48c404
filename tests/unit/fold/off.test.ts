import { describe, expect, it } from 'vitest'
import { conditionOf, currentOf, openRows, type Fact } from '@/lib/analysis/fold'
import { foldStory, inHg, rowsOf, story } from './story'
import { FROM, HOUR } from './worlds'

const EACH_MINUTE = { intervalSeconds: 60 }
const settings: Fact = {
  kind: 'settings',
  at: FROM,
  settings: { kind: 'pass-through', cutOutPa: inHg(10), cutInPa: inHg(8) },
}

describe('a pump that is off', () => {
  it('ends the hold where the vacuum went an inch under the cut-in, known ten minutes later', () => {
    const told = story(EACH_MINUTE).cycle(6, 2, 8, 10, 47)
    const stop = told.now()
    // 10 inHg at 2 an hour: 7 inHg after an hour and a half.
    told.hold(3 * 3600, 2)
    const { rows, state } = foldStory(told, EACH_MINUTE, [settings])
    const hold = rowsOf(rows, 'hold').slice(-1)[0]
    const crossed = stop + 1.5 * HOUR
    expect(hold).toMatchObject({ startedAt: stop, ending: 'interrupted' })
    expect(Math.abs((hold?.endedAt ?? 0) - crossed)).toBeLessThanOrEqual(60_000)
    expect((hold?.knownAt ?? 0) - (hold?.endedAt ?? 0)).toBeGreaterThanOrEqual(600_000)
    expect(conditionOf(state).offSince).toBe(hold?.endedAt)
    expect(openRows(state).hold).toBeNull()
    const leg = rowsOf(rows, 'leg').slice(-1)[0]
    expect(leg?.endedAt).toBeLessThan(hold?.endedAt ?? 0)
    expect(leg?.rate?.paPerHour).toBeCloseTo(inHg(2), -2)
  })

  it('calls the run after it a startup, and holds go on', () => {
    const told = story(EACH_MINUTE)
      .cycle(6, 2, 8, 10, 47)
      .hold(3 * 3600, 2)
      .run(150, 10)
    const { rows, state } = foldStory(told.cycle(2, 2, 8, 10, 47).hold(60, 2), EACH_MINUTE)
    expect(rowsOf(rows, 'run')[6]?.trigger).toBe('startup')
    expect(
      rowsOf(rows, 'hold')
        .slice(-2)
        .map((hold) => hold.ending),
    ).toEqual(['leak', 'leak'])
    expect(conditionOf(state).offSince).toBeNull()
  })

  it('is told by the vacuum alone too', () => {
    const vacuumOnly = { intervalSeconds: 20, pump: false }
    const told = story(vacuumOnly)
      .cycle(6, 2)
      .hold(3 * 3600, 2)
    const { state } = foldStory(told, vacuumOnly)
    expect(conditionOf(state).offSince).not.toBeNull()
  })

  it('does not wait for the vacuum where people said so', () => {
    const told = story(EACH_MINUTE).cycle(2, 2, 8, 10, 47).hold(1800, 2)
    const said: Fact = { kind: 'statement', at: told.now(), value: 'off' }
    told.hold(7200, 2)
    const { rows, state } = foldStory(told, EACH_MINUTE, [said])
    expect(conditionOf(state)).toMatchObject({
      offSince: said.at,
      statement: { value: 'off', since: said.at },
    })
    expect(rowsOf(rows, 'hold').slice(-1)[0]).toMatchObject({ ending: 'interrupted', knownAt: said.at })
  })
})

describe('statements', () => {
  it('sets aside the hold and the legs while people work, not the leg before', () => {
    const told = story(EACH_MINUTE).cycle(1, 2, 8, 10, 47).hold(1200, 1)
    const from: Fact = { kind: 'statement', at: told.now(), value: 'worked-on' }
    told.hold(1200, 1)
    const until: Fact = { kind: 'statement', at: told.now(), value: null }
    told.cycle(2, 2, 8, 10, 47).hold(60, 1)
    const { rows } = foldStory(told, EACH_MINUTE, [from, until])
    const holds = rowsOf(rows, 'hold')
    expect(holds.map((hold) => hold.setAside)).toEqual([false, true, false])
    const legs = rowsOf(rows, 'leg').filter((leg) => leg.holdStartedAt === holds[1]?.startedAt)
    expect(legs.map((leg) => leg.setAside)).toEqual([false, true, false])
  })

  it('teaches nothing while the boat is laid up', () => {
    const laidUp: Fact = { kind: 'statement', at: FROM, value: 'laid-up' }
    const { state } = foldStory(story(EACH_MINUTE).cycle(8, 2, 8, 10, 47), EACH_MINUTE, [laidUp])
    expect(Object.values(state.rings).every((ring) => ring.length === 0)).toBe(true)
  })
})

describe('loggers', () => {
  it('follows a change of logger: channels, and a hold that it interrupts', () => {
    const told = story(EACH_MINUTE).cycle(2, 2, 8, 10, 47).hold(1800, 1)
    const at = told.now()
    const refit: Fact = {
      kind: 'fitting',
      at,
      loggerId: '2',
      intervalSeconds: 60,
      channels: { pump: false, vacuum: true },
    }
    told.hold(1800, 1)
    const samples = told.samples.map((sample) => (sample.at >= at ? { ...sample, pumpOn: null } : sample))
    const { rows, state } = foldStory({ samples }, EACH_MINUTE, [refit])
    expect(rowsOf(rows, 'hold').slice(-1)[0]).toMatchObject({ ending: 'interrupted', knownAt: at })
    expect(openRows(state).hold).not.toBeNull()
    expect(openRows(state).leg?.startedAt).toBeGreaterThanOrEqual(at)
  })
})

describe('running on', () => {
  it('is a run far past what its recharge needs, with the vacuum at rest', () => {
    const told = story(EACH_MINUTE).cycle(6, 2, 8, 10, 47).hold(3600, 2)
    const start = told.now()
    const { samples } = told.run(60, 9).run(600, 9.01)
    const on = samples.map((sample) => (sample.at >= start ? { ...sample, pumpOn: true } : sample))
    const { state } = foldStory({ samples: on }, EACH_MINUTE)
    const since = conditionOf(state).runningOnSince ?? 0
    expect(since - start).toBeGreaterThanOrEqual(300_000)
    expect(since - start).toBeLessThanOrEqual(420_000)
    expect(currentOf(state)).toMatchObject({ pumpOn: true, holdSoFarSeconds: null })
  })

  it('is not a startup that takes long and rises', () => {
    const told = story({ ...EACH_MINUTE, startInHg: 0 }).hold(120, 0)
    const start = told.now()
    const { samples } = told.run(900, 9)
    const on = samples.map((sample) => (sample.at >= start ? { ...sample, pumpOn: true } : sample))
    expect(conditionOf(foldStory({ samples: on }, EACH_MINUTE).state).runningOnSince).toBeNull()
  })
})
