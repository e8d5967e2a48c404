import { describe, expect, it } from 'vitest'
import { learned, type Fact } from '@/lib/analysis/fold'
import { foldStory, inHg, rowsOf, story } from './story'
import { FROM } from './worlds'

// Runs of 37 s: their edges fall within 30 s of a sample often enough to teach.
const EACH_20_S = { intervalSeconds: 20 }
const settings: Fact = {
  kind: 'settings',
  at: FROM,
  settings: { kind: 'pass-through', cutOutPa: inHg(10.5), cutInPa: inHg(8.5) },
}

describe('what the system teaches', () => {
  it('starts from the set-up and goes over to five readings of its own', () => {
    const told = story(EACH_20_S).cycle(3, 2, 8, 10, 37)
    const early = learned(foldStory(told, EACH_20_S, [settings]).state)
    expect(early).toMatchObject({ cutOutPa: inHg(10.5), cutInPa: inHg(8.5) })
    const { state, rows } = foldStory(told.cycle(6, 2, 8, 10, 37), EACH_20_S, [settings])
    const late = learned(state)
    expect(late.cutOutPa).toBeCloseTo(inHg(10), 0)
    expect(late.cutInPa).toBeCloseTo(inHg(8), 0)
    expect(late.rechargePaPerSecond).toBeCloseTo(inHg(2) / 37, 0)
    expect(late.counts.cutOut).toBe(9)
    expect(rowsOf(rows, 'hold')[0]?.learnedCutInPa).toBe(inHg(8.5))
  })

  it('falls back to the usual ten and eight inches where nothing is known', () => {
    const none = learned(foldStory({ samples: [] }, EACH_20_S).state)
    expect(none.cutOutPa).toBeCloseTo(33863.9, 0)
    expect(none.cutInPa).toBeCloseTo(27091.1, 0)
    expect(none.rechargePaPerSecond).toBeNull()
  })

  it('learns a switch that creeps, hold after hold', () => {
    const told = story(EACH_20_S)
    for (let i = 0; i < 60; i += 1) told.cycle(1, 4, 8 - i * 0.03, 10 - i * 0.01, 37)
    const { state, rows } = foldStory(told, EACH_20_S)
    // Medians of 21 lag by ten holds.
    expect(learned(state).cutInPa).toBeCloseTo(inHg(8 - 49 * 0.03), -1)
    expect(learned(state).cutOutPa).toBeCloseTo(inHg(10 - 49 * 0.01), -1)
    expect(rowsOf(rows, 'run').every((run) => run.trigger === 'leak')).toBe(true)
  })

  it.each([
    ['up', 9.2],
    ['down', 6.4],
  ])('learns a switch that was set %s at once', (_, cutIn) => {
    const told = story(EACH_20_S).cycle(10, 2, 8, 10, 37).cycle(20, 2, cutIn, 10, 37)
    const { state, rows } = foldStory(told.hold(60, 1), EACH_20_S)
    expect(learned(state).cutInPa).toBeCloseTo(inHg(cutIn), -1)
    expect(
      rowsOf(rows, 'hold')
        .slice(-10)
        .every((hold) => hold.ending === 'leak'),
    ).toBe(true)
  })

  it('learns a switch that was set up even where the samples do not show its level', () => {
    const periodic = { intervalSeconds: 60, edges: false }
    const told = story(periodic).cycle(10, 2, 8, 10, 130).cycle(20, 2, 9.2, 10, 130)
    const { state, rows } = foldStory(told.hold(60, 1), periodic, [settings])
    expect(Math.abs(learned(state).cutInPa - inHg(9.2))).toBeLessThan(inHg(0.1))
    expect(
      rowsOf(rows, 'hold')
        .slice(-10)
        .every((hold) => hold.ending === 'leak'),
    ).toBe(true)
  })

  it('does not take restarts at a breaker for the switch', () => {
    const told = story(EACH_20_S).cycle(10, 2, 8, 10, 37)
    for (let night = 0; night < 8; night += 1) {
      told
        .hold(6300 + night * 700, 2)
        .run(110, 10)
        .cycle(1, 2, 8, 10, 37)
    }
    expect(learned(foldStory(told, EACH_20_S).state).cutInPa).toBeCloseTo(inHg(8), -1)
  })

  it('learns a pump that has become slower, and then knows its leak runs again', () => {
    const told = story(EACH_20_S).cycle(10, 2, 8, 10, 37).cycle(15, 2, 8, 10, 57)
    const { state, rows } = foldStory(told.hold(60, 1), EACH_20_S)
    expect(
      rowsOf(rows, 'run')
        .slice(-8)
        .every((run) => run.trigger === 'leak'),
    ).toBe(true)
    expect(learned(state).runSeconds).toBeCloseTo(57, 0)
  })

  it('learns the settled top apart from the cut-out', () => {
    const told = story(EACH_20_S)
    for (let i = 0; i < 8; i += 1) told.cycle(1, 1, 8, 10, 37).drop(0.2, 60).hold(600, 1)
    const taught = learned(foldStory(told, EACH_20_S).state)
    expect(taught.cutOutPa).toBeCloseTo(inHg(10), 0)
    expect(taught.settledPa).toBeGreaterThan(inHg(9.7))
    expect(taught.settledPa).toBeLessThan(inHg(9.9))
  })
})
