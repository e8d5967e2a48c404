import { describe, expect, test } from 'vitest'
import { fitLegs, holdSecondsOf, ratePaPerHourAt } from '@/lib/analysis/fit'
import { holdSecondsAtRate } from '@/lib/analysis/gas'
import { AT, HOUR_MS, INHG, lawOf, leg } from './record-rows'

const BAND = { at: AT, cutOutPa: 10 * INHG, cutInPa: 8 * INHG, standardPressurePa: 101_325 }

describe('the two laws', () => {
  test('a laminar leak slows by 17 % from 10 to 8 inHg, an orifice by 6 %', () => {
    const slowed = (share: number) =>
      1 - ratePaPerHourAt(lawOf(1000, share), 8 * INHG) / ratePaPerHourAt(lawOf(1000, share), 10 * INHG)
    expect(slowed(0)).toBeCloseTo(0.17, 2)
    expect(slowed(1)).toBeCloseTo(0.06, 1)
  })

  test('holds are ∫ dp / rate, nothing where the top is not above, endless without a leak', () => {
    const law = lawOf(0.6 * INHG)
    expect(holdSecondsOf(law, 10 * INHG, 8 * INHG) / 3600).toBeCloseTo(2 / 0.6, 1)
    expect(holdSecondsOf(law, 8 * INHG, 8 * INHG)).toBe(0)
    expect(holdSecondsOf(lawOf(0), 10 * INHG, 8 * INHG)).toBe(Infinity)
  })

  // Common practice, no source: 0.3 inHg in 30 minutes and 3 hours between runs are one rule at 1.8 inHg.
  test('0.3 inHg in 30 minutes is a hold of 3 h with a differential of 1.8 inHg', () => {
    const law = { ...lawOf(0.6 * INHG), midPa: 9.1 * INHG }
    expect(holdSecondsAtRate(1.8 * INHG, (0.3 * INHG) / 0.5)).toBeCloseTo(3 * 3600, 6)
    expect(holdSecondsOf(law, 10 * INHG, 8.2 * INHG) / 3600).toBeCloseTo(3, 1)
  })
})

describe('fit over legs', () => {
  const legsOf = (paPerHour: number, share: number, count = 8) =>
    Array.from({ length: count }, (_, i) =>
      leg(AT - (count - i) * 2 * HOUR_MS, 5400, lawOf(paPerHour, share)),
    )

  test.each([0, 0.5, 1])('finds rate and hold time of exact legs, orifice share %s', (share) => {
    const fit = fitLegs({ ...BAND, legs: legsOf(2000, share) })
    const truth = holdSecondsOf(lawOf(2000, share), 10 * INHG, 8 * INHG)
    expect(fit?.holdSeconds).toBeDefined()
    expect(Math.abs((fit?.holdSeconds ?? 0) / truth - 1)).toBeLessThan(0.01)
    expect(fit?.legs).toBe(8)
  })

  test('nothing to fit: null; bins that are not finite are left out', () => {
    expect(fitLegs({ ...BAND, legs: [] })).toBeNull()
    const broken = leg(AT - HOUR_MS, 1800, lawOf(2000))
    broken.bins.vacuumPa.fill(NaN)
    expect(fitLegs({ ...BAND, legs: [broken] })).toBeNull()
    const partly = leg(AT - HOUR_MS, 3000, lawOf(2000))
    partly.bins.vacuumPa[7] = NaN
    const fit = fitLegs({ ...BAND, legs: [partly, ...legsOf(2000, 0.5)] })
    expect(Math.abs((fit?.ratePaPerHour ?? 0) / 2000 - 1)).toBeLessThan(0.02)
  })

  test('one leg gives a fit, with a wider error than eight', () => {
    const one = fitLegs({ ...BAND, legs: legsOf(2000, 0.5, 1) })
    const eight = fitLegs({ ...BAND, legs: legsOf(2000, 0.5) })
    expect(one).not.toBeNull()
    expect(one?.rateSigma ?? 0).toBeGreaterThan(eight?.rateSigma ?? Infinity)
  })

  test('a gauge that never stepped gives about nought, with an error of a step over the time', () => {
    const flat = leg(AT - 3 * HOUR_MS, 7200, lawOf(10), { gaugePa: 338.6 })
    const fit = fitLegs({ ...BAND, legs: [flat] })
    expect(Math.abs(fit?.ratePaPerHour ?? Infinity)).toBeLessThan(100)
    expect(fit?.rateSigma ?? 0).toBeGreaterThan(30)
  })

  test('short legs of a coarse gauge still add up', () => {
    const legs = Array.from({ length: 40 }, (_, i) =>
      leg(AT - (40 - i) * 1_500_000, 1200, lawOf(1500), { gaugePa: 338.6, fromPa: (9.2 + 0.02 * i) * INHG }),
    )
    const fit = fitLegs({ ...BAND, legs })
    expect(Math.abs((fit?.ratePaPerHour ?? 0) / 1500 - 1)).toBeLessThan(0.06)
  })

  test('a leg that does not fit the rest is set aside and counted', () => {
    const odd = leg(AT - 3 * HOUR_MS, 5400, lawOf(9000))
    const fit = fitLegs({ ...BAND, legs: [...legsOf(2000, 0.5), odd] })
    expect(fit?.legsSetAside).toBe(1)
    expect(Math.abs((fit?.ratePaPerHour ?? 0) / 2000 - 1)).toBeLessThan(0.02)
  })

  test('what was given is not changed', () => {
    const legs = legsOf(2000, 0.5)
    const before = JSON.stringify(legs)
    fitLegs({ ...BAND, legs: Object.freeze(legs) })
    expect(JSON.stringify(legs)).toBe(before)
  })
})
