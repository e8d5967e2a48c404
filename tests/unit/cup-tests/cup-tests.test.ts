import { describe, expect, it } from 'vitest'
import type { CupLeg } from '@/db/queries/cup-tests'
import { judge, minutesLeft, type CupFacts } from '@/lib/cup-tests/judge'
import { pooled, ratesWithin } from '@/lib/cup-tests/rates'
import { spansOf } from '@/lib/cup-tests/spans'

const HOUR = 3_600_000
const WATER = Date.parse('2026-08-02T22:00:00Z')
const known = { waterAt: WATER, at: WATER + HOUR, flushes: [], previousWaterAt: null, nextWaterAt: null }

describe('the stretches that speak of a cup test', () => {
  it('run from six hours before to the present while nobody flushes', () => {
    expect(spansOf(known)).toEqual({
      before: [WATER - 6 * HOUR, WATER],
      wet: [WATER, WATER + HOUR],
      after: null,
      flushedAt: null,
      over: false,
    })
  })

  it('turn at the first flush after the water, not at one before it', () => {
    const flush = WATER + HOUR / 2
    const spans = spansOf({ ...known, flushes: [WATER - HOUR, flush, WATER + 0.9 * HOUR] })
    expect(spans).toMatchObject({ wet: [WATER, flush], after: [flush, WATER + HOUR], over: true })
    expect(spans.before[0]).toBe(WATER - HOUR)
    const disturbed = spansOf({ ...known, flushes: [WATER - HOUR, WATER - HOUR / 4] })
    expect(disturbed.before[0]).toBe(WATER - 6 * HOUR)
  })

  it('begin where the bowl before was dry again, or with its water where nobody flushed', () => {
    const previousWaterAt = WATER - 2 * HOUR
    expect(spansOf({ ...known, previousWaterAt }).before[0]).toBe(previousWaterAt)
    const flushes = [WATER - 3 * HOUR, WATER - HOUR]
    expect(spansOf({ ...known, previousWaterAt, flushes }).before[0]).toBe(WATER - HOUR)
  })

  it('end where the next bowl is wetted, and after twelve hours', () => {
    const next = spansOf({ ...known, nextWaterAt: WATER + HOUR / 2, flushes: [WATER + 0.9 * HOUR] })
    expect(next).toMatchObject({ wet: [WATER, WATER + HOUR / 2], after: null, flushedAt: null, over: true })
    const late = spansOf({ ...known, at: WATER + 20 * HOUR })
    expect(late).toMatchObject({ wet: [WATER, WATER + 12 * HOUR], over: true })
  })
})

/** A leg of a line that falls by 2000 Pa/h, and by 200 from the water on: a bin a minute, an hour before and after. */
const broken: CupLeg = (() => {
  const size = 120
  const offsetSeconds = Array.from({ length: size }, (_, i) => 60 * i + 30)
  const none = offsetSeconds.map(() => null)
  const fallen = (seconds: number): number =>
    seconds < 3600 ? (2000 * seconds) / 3600 : 2000 + (200 * (seconds - 3600)) / 3600
  return {
    startedAt: WATER - HOUR,
    endedAt: WATER + HOUR,
    rate: { paPerHour: 1100, low: 900, high: 1300 },
    bins: {
      widthSeconds: 60,
      offsetSeconds,
      count: offsetSeconds.map(() => 6),
      vacuumPa: offsetSeconds.map((seconds, i) => 33_000 - fallen(seconds) + (i % 2 === 0 ? 2 : -2)),
      airC: none,
      laggedAirC: [none, none],
      barometerPa: none,
    },
  }
})()

describe('rates', () => {
  it('cut a leg where the water went in, rather than take its one rate for both sides', () => {
    const [before] = ratesWithin([broken], [WATER - 6 * HOUR, WATER])
    const [wet] = ratesWithin([broken], [WATER, WATER + HOUR])
    expect(before?.paPerHour).toBeCloseTo(2000, -1)
    expect(wet?.paPerHour).toBeCloseTo(200, -1)
    expect(ratesWithin([{ ...broken, bins: null }], [WATER, WATER + HOUR])).toEqual([])
  })

  it('are weighed by their errors, and doubted where they disagree', () => {
    expect(pooled([])).toBeNull()
    const alike = pooled([
      { paPerHour: 100, sigma: 10 },
      { paPerHour: 100, sigma: 10 },
    ])
    expect(alike?.sigma).toBeCloseTo(10 / Math.SQRT2, 10)
    const weighed = pooled([
      { paPerHour: 100, sigma: 10 },
      { paPerHour: 200, sigma: 20 },
    ])
    // (100/100 + 200/400) / (1/100 + 1/400) = 120; chi-square (20/10)² + (80/20)² = 20.
    expect(weighed?.paPerHour).toBeCloseTo(120, 10)
    expect(weighed?.sigma).toBeCloseTo(Math.sqrt(20 / (1 / 100 + 1 / 400)), 10)
  })
})

const facts = (change: Partial<CupFacts>): CupFacts => ({
  headName: 'Forward head',
  before: { paPerHour: 2000, sigma: 60 },
  wet: { paPerHour: 200, sigma: 60 },
  after: null,
  wetMinutes: 40,
  afterMinutes: 120,
  over: false,
  ...change,
})

describe('the verdict', () => {
  it('says which seal it is, and what the flush did', () => {
    const wet = judge(facts({}))
    expect(wet).toMatchObject({ verdict: 'seal', minutesLeft: null })
    expect(wet.sentence).toMatch(/seal of Forward head: water took 90 % .* Flush it once/)
    const back = judge(facts({ over: true, after: { paPerHour: 1950, sigma: 60 } }))
    expect(back.sentence).toMatch(/90 % of the leak away, and a flush brought it back/)
    const stayed = judge(facts({ over: true, after: { paPerHour: 230, sigma: 60 } }))
    const soon = judge(facts({ over: true, afterMinutes: 20, after: { paPerHour: 230, sigma: 60 } }))
    expect(soon.sentence).toMatch(/shows within an hour or two/)
    expect(stayed.sentence).toMatch(/did not bring it back/)
  })

  it('clears the bowl whose water changed nothing', () => {
    const cleared = judge(facts({ wet: { paPerHour: 1980, sigma: 60 } }))
    expect(cleared.verdict).toBe('cleared')
    expect(cleared.sentence).toMatch(/Forward head: its seal is cleared. Flush it, and try the next bowl/)
  })

  it('waits for half an hour, however plain it looks', () => {
    const early = judge(facts({ wetMinutes: 12 }))
    expect(early).toMatchObject({ verdict: null, minutesLeft: 18 })
    expect(early.sentence).toMatch(/about 18 more minutes without a flush. So far the leak is 10 %/)
  })

  it('says how much longer by how fast a slope’s error falls', () => {
    // Wanted: the square root of (0.15 × 2000)² − 60² = 294; 588 is twice that, so 2^(2/3) times as long.
    const left = minutesLeft(facts({ wet: { paPerHour: 1600, sigma: 587.88 }, wetMinutes: 40 }))
    expect(left).toBe(Math.ceil(40 * (2 ** (2 / 3) - 1)))
    // A fall by a fifth, well measured, is neither: waiting on would never end.
    expect(minutesLeft(facts({ wet: { paPerHour: 1600, sigma: 40 } }))).toBeNull()
  })

  it('cannot tell, and says why', () => {
    const why = (change: Partial<CupFacts>) => {
      const { verdict, sentence } = judge(facts(change))
      expect(verdict).toBe('cannot-tell')
      return sentence
    }
    expect(why({ before: null })).toMatch(/before the water was not measured/)
    expect(why({ before: { paPerHour: 80, sigma: 60 } })).toMatch(/hardly a leak/)
    expect(why({ wet: null, over: true })).toMatch(/a flush came before/)
    expect(why({ wet: null, wetMinutes: 200 })).toMatch(/logger is heard/)
    expect(why({ wet: { paPerHour: 1500, sigma: 300 }, over: true })).toMatch(/changed too little/)
  })
})
