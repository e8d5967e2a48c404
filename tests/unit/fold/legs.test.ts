import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { legRate, LAG_SECONDS, openRows, type LegBins } from '@/lib/analysis/fold'
import { fastTheilSen } from '@/lib/analysis/fold/theil-sen-fast'
import { addToLeg, binsOf, openLeg } from '@/lib/analysis/fold/leg-bins'
import { initialState } from '@/lib/analysis/fold'
import { compensatedPressurePa, lagTemperature } from '@/lib/analysis/gas'
import { theilSen } from '@/lib/analysis/statistics'
import { foldStory, inHg, rowsOf, story } from './story'
import { FROM, MINUTE, sampleAt } from './worlds'
import { times } from '@/tests/support/long'

const EACH_MINUTE = { intervalSeconds: 60 }
const channels = initialState().channels

describe('bins of a leg', () => {
  it('hold the means of their samples on a grid from the start, however wide they have become', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.integer({ min: 1, max: 400 }), fc.integer({ min: 0, max: 400_000 })), {
          minLength: 1,
          maxLength: 600,
          size: 'max',
        }),
        (told) => {
          const leg = openLeg(FROM, null, false)
          let seconds = 0
          const samples = told.map(([after, tenths], i) => {
            seconds += i === 0 ? 0 : after
            return { seconds, pa: tenths / 10 }
          })
          for (const sample of samples) addToLeg(leg, FROM + sample.seconds * 1000, sample.pa, channels)
          const bins = binsOf(leg)
          expect(bins.count.length).toBeLessThanOrEqual(120)
          expect(Math.log2(bins.widthSeconds / 15) % 1).toBe(0)
          const groups = new Map<number, typeof samples>()
          for (const sample of samples) {
            const key = Math.floor(sample.seconds / bins.widthSeconds)
            groups.set(key, [...(groups.get(key) ?? []), sample])
          }
          expect(bins.count).toEqual([...groups.values()].map((group) => group.length))
          ;[...groups.values()].forEach((group, i) => {
            const mean = (pick: (sample: { seconds: number; pa: number }) => number) =>
              group.reduce((sum, sample) => sum + pick(sample), 0) / group.length
            // Each doubling rounds anew.
            expect(Math.abs((bins.vacuumPa[i] ?? 0) - mean((sample) => sample.pa))).toBeLessThan(0.1)
            expect(Math.abs((bins.offsetSeconds[i] ?? 0) - mean((sample) => sample.seconds))).toBeLessThan(
              1.5,
            )
          })
        },
      ),
      { numRuns: times(100) },
    )
  })

  it('carry air and barometer for fifteen minutes and no longer', () => {
    const told = story(EACH_MINUTE).cycle(1, 2, 8, 10, 47)
    const from = told.now()
    told.hold(3600, 1)
    const samples = told.samples.map((sample) => ({
      ...sample,
      airC: sample.at <= from + 10 * MINUTE ? 18 : null,
      barometerPa: sample.at <= from + 10 * MINUTE ? 101_000 : null,
    }))
    const bins = openRows(foldStory({ samples }, EACH_MINUTE).state).leg?.bins
    const start = openRows(foldStory({ samples }, EACH_MINUTE).state).leg?.startedAt ?? 0
    bins?.offsetSeconds.forEach((offset, i) => {
      const minutes = (start - from) / MINUTE + offset / 60
      // The last reading came up to a minute before the ten were over.
      if (minutes > 24 && minutes < 25.5) return
      expect(bins.airC[i] === null).toBe(minutes > 24.5)
      expect(bins.barometerPa[i] === null).toBe(minutes > 24.5)
      if (bins.airC[i] !== null) expect(bins.laggedAirC[1][i]).toBeCloseTo(18, 2)
    })
  })

  it('keep the air behind its lags as the gas arithmetic has it', () => {
    const told = story(EACH_MINUTE).hold(4 * 3600, 0.2)
    const samples = told.samples.map((sample, i) => ({
      ...sample,
      airC: 15 + Math.round(300 * Math.sin(i / 40)) / 100,
    }))
    const { state } = foldStory({ samples }, EACH_MINUTE)
    const points = samples.map((sample) => ({ atSeconds: sample.at / 1000, airC: sample.airC }))
    LAG_SECONDS.forEach((seconds, i) => {
      const [last] = lagTemperature(points, seconds).slice(-1)
      expect(state.channels.laggedAirC[i]).toBeCloseTo(last ?? NaN, 6)
    })
  })
})

describe("a leg's own rate", () => {
  it('is the Theil–Sen slope of the statistics library on the same points', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 500 }), { minLength: 8, maxLength: 40 }), (ys) => {
        const xs = ys.map((_, i) => i * 15)
        const ours = fastTheilSen(xs, ys)
        const theirs = theilSen(ys.map((y, i) => ({ x: i * 15, y })))
        expect(ours?.slope).toBeCloseTo(theirs?.slope ?? NaN, 9)
        if (theirs?.low != null) expect(ours?.low).toBeCloseTo(theirs.low, 9)
        if (theirs?.high != null) expect(ours?.high).toBeCloseTo(theirs.high, 9)
      }),
    )
  })

  const binsAt = (
    seconds: number,
    vacuumAt: (second: number) => number,
    weather: Partial<LegBins> = {},
  ): LegBins => {
    const offsetSeconds = Array.from({ length: Math.floor(seconds / 60) + 1 }, (_, i) => i * 60)
    const nothing = offsetSeconds.map(() => null)
    return {
      widthSeconds: 60,
      offsetSeconds,
      count: offsetSeconds.map(() => 1),
      vacuumPa: offsetSeconds.map(vacuumAt),
      airC: nothing,
      laggedAirC: [nothing, nothing],
      barometerPa: nothing,
      ...weather,
    }
  }

  it('needs five minutes and eight bins', () => {
    const falling = (second: number): number => 33_000 - second / 10
    expect(legRate(binsAt(360, falling))).toBeNull()
    expect(legRate(binsAt(420, falling))?.paPerHour).toBeCloseTo(360, 6)
    expect(legRate({ ...binsAt(420, falling), offsetSeconds: [0, 15, 30, 45, 60, 75, 90, 105] })).toBeNull()
  })

  it('takes the weather out of a tight leg', () => {
    const seconds = 6 * 3600
    const shape = binsAt(seconds, () => 0)
    const airC = shape.offsetSeconds.map((second) => 20 - (4 * second) / seconds)
    const barometerPa = shape.offsetSeconds.map((second) => 101_000 + (500 * second) / seconds)
    // What a sealed, half-saturated system would read: the compensated pressure stays.
    const sealedPa = compensatedPressurePa({ vacuumPa: 33_000, barometerPa: 101_000, gasTempC: 20 })
    const vacuumPa = shape.offsetSeconds.map((_, i) => {
      let [low, high] = [0, 60_000]
      for (let step = 0; step < 60; step += 1) {
        const middle = (low + high) / 2
        const reading = { vacuumPa: middle, barometerPa: barometerPa[i], gasTempC: airC[i] }
        if (compensatedPressurePa(reading) > sealedPa) low = middle
        else high = middle
      }
      return low
    })
    const raw = legRate({ ...shape, vacuumPa })
    const corrected = legRate({ ...shape, vacuumPa, airC, laggedAirC: [airC, airC], barometerPa })
    expect(Math.abs(raw?.paPerHour ?? 0)).toBeGreaterThan(50)
    expect(raw?.compensated).toBe(false)
    expect(Math.abs(corrected?.paPerHour ?? 99)).toBeLessThan(0.1)
    expect(corrected?.compensated).toBe(true)
    expect(corrected?.low).toBeLessThan(-30)
    expect(corrected?.high).toBeGreaterThan(30)
  })

  it('begins a leg after the settling and ends it with the hold', () => {
    const told = story(EACH_MINUTE).cycle(2, 2, 8, 10, 47).hold(60, 1)
    const { rows } = foldStory(told, EACH_MINUTE)
    const hold = rowsOf(rows, 'hold')[1]
    const leg = rowsOf(rows, 'leg')[1]
    expect(leg?.holdStartedAt).toBe(hold?.startedAt)
    expect((leg?.startedAt ?? 0) - (hold?.startedAt ?? 0)).toBeGreaterThanOrEqual(60_000)
    expect((leg?.startedAt ?? 0) - (hold?.startedAt ?? 0)).toBeLessThanOrEqual(180_000)
    expect(leg?.endedAt).toBeLessThan(hold?.endedAt ?? 0)
    expect(leg?.rate?.paPerHour).toBeCloseTo(inHg(2), -1)
  })

  it('leaves bins without air null where a logger has no such channel', () => {
    const { state } = foldStory(
      { samples: [sampleAt(FROM, { vacuumPa: 33_000, pumpOn: false })] },
      EACH_MINUTE,
    )
    expect(openRows(state).leg?.bins.airC).toEqual([null])
  })
})
