import { describe, expect, it } from 'vitest'
import { AIR_GAS_CONSTANT, PA_PER_INHG, STANDARD_PRESSURE_PA } from '@/simulator/physics/constants'
import { airAmount, dryPressurePa, saturationPressurePa } from '@/simulator/physics/gas'
import {
  CRITICAL_RATIO,
  areaForFlow,
  conductanceForFlow,
  flowForHold,
  holdSeconds,
  laminarInflow,
  leakInflow,
  nozzleFunction,
  orificeInflow,
} from '@/simulator/physics/leak-flow'
import { freshCondition, leakFactorAt, type LeakSpec } from '@/simulator/physics/leaks'
import { pumpingSpeed } from '@/simulator/physics/pump'
import { weatherOf } from '@/simulator/physics/weather'

const relative = (value: number, expected: number): number => Math.abs(value / expected - 1)

describe('flow through a hole', () => {
  it('chokes at the critical ratio of gas dynamics, (2/(k+1))^(k/(k−1)) = 0.52828 (Anderson; White)', () => {
    expect(CRITICAL_RATIO).toBeCloseTo(0.528281787717174, 12)
  })

  it('has the choked constant 0.68473 (NASA Glenn, mass flow choking: the equation read, evaluated for air)', () => {
    expect(nozzleFunction(0.5)).toBeCloseTo(0.6847314563772704, 12)
    expect(nozzleFunction(0)).toBe(nozzleFunction(0.52))
  })

  it('is unchoked between 10 and 8 inHg and chokes at 14.11 inHg of vacuum (derived from the critical ratio)', () => {
    const vacuumAtChoking = (STANDARD_PRESSURE_PA * (1 - CRITICAL_RATIO)) / PA_PER_INHG
    expect(vacuumAtChoking).toBeCloseTo(14.114401191336603, 6)
    const at = (inHg: number) =>
      orificeInflow(1e-6, STANDARD_PRESSURE_PA, STANDARD_PRESSURE_PA - inHg * PA_PER_INHG, 293.15)
    expect(at(10)).toBeGreaterThan(at(8))
    expect(at(16)).toBe(at(20))
  })

  it('gives the mass flow of a 1 mm hole into a vacuum (isentropic formula, coefficient 1, 20 °C; computed)', () => {
    const area = (Math.PI * 1e-6) / 4
    const table = [
      [67461.11359659, 0.000179800894405],
      [53915.559035226, 0.000187839509108],
      [47142.781754544, 0.000187845535426],
      [90000, 0.000121692628302],
      [100000, 4.40535912586e-5],
      [101000, 2.19346866647e-5],
    ] as const
    for (const [inside, kgPerSecond] of table) {
      const massFlow = orificeInflow(area, STANDARD_PRESSURE_PA, inside, 293.15) / AIR_GAS_CONSTANT
      expect(relative(massFlow, kgPerSecond)).toBeLessThan(1e-8)
    }
  })

  it('runs the other way, as much, when the inside is above the outside', () => {
    expect(orificeInflow(1e-6, 90000, 100000, 293.15)).toBe(-orificeInflow(1e-6, 100000, 90000, 293.15))
    expect(laminarInflow(1e-9, 90000, 100000, 293.15)).toBe(-laminarInflow(1e-9, 100000, 90000, 293.15))
  })
})

describe('the two laws between 10 and 8 inHg', () => {
  const rateRatio = (law: { areaM2: number; conductance: number }) => {
    const at = (inHg: number) =>
      leakInflow(law, STANDARD_PRESSURE_PA, STANDARD_PRESSURE_PA - inHg * PA_PER_INHG, 293.15)
    return 1 - at(8) / at(10)
  }
  it('slow by 17 % when laminar and by 6 % through an orifice', () => {
    expect(rateRatio({ areaM2: 0, conductance: 1 })).toBeCloseTo(0.17, 2)
    expect(rateRatio({ areaM2: 1, conductance: 0 })).toBeCloseTo(0.06, 2)
  })

  it('a flow made for a hold time gives that hold time back', () => {
    const [cutOut, cutIn] = [10 * PA_PER_INHG, 8 * PA_PER_INHG]
    for (const hours of [0.1, 1.4, 30]) {
      const orifice = flowForHold('orifice', hours * 3600, 0.04, cutOut, cutIn)
      const laminar = flowForHold('laminar', hours * 3600, 0.04, cutOut, cutIn)
      const half = { areaM2: areaForFlow(orifice / 2), conductance: conductanceForFlow(laminar / 2) }
      expect(relative(holdSeconds(half, 0.04, cutOut, cutIn), hours * 3600)).toBeLessThan(2e-3)
      expect(holdSeconds({ areaM2: areaForFlow(orifice), conductance: 0 }, 0.04, cutOut, cutIn)).toBeCloseTo(
        hours * 3600,
        4,
      )
    }
  })

  it('one rule of thumb is the other: 0.3 inHg in 30 minutes is 3 h of a 1.8 inHg differential (common practice, no source)', () => {
    // A hole so far into choking that the rate is steady: 0.6 inHg/h.
    const law = {
      areaM2:
        (0.04 * 0.6 * PA_PER_INHG) / 3600 / (293.15 * orificeInflow(1, STANDARD_PRESSURE_PA, 4e4, 293.15)),
      conductance: 0,
    }
    expect(holdSeconds(law, 0.04, 18 * PA_PER_INHG, 16.2 * PA_PER_INHG)).toBeCloseTo(3 * 3600, 6)
  })

  it('never ends without a leak', () => {
    expect(holdSeconds({ areaM2: 0, conductance: 0 }, 0.04, 33864, 27091)).toBe(Number.POSITIVE_INFINITY)
  })
})

describe('the gas', () => {
  it('warmed by 5 K at constant volume rises as p/T says (50,000 Pa at 20 °C to 50,852.8; computed)', () => {
    expect(dryPressurePa(airAmount(50000, 0.04, 293.15), 0.04, 298.15)).toBeCloseTo(50852.80573085451, 6)
  })
  it('holds vapour at 2.34 kPa when saturated at 20 °C (CRC Handbook 2.3388 kPa, value from memory)', () => {
    expect(relative(saturationPressurePa(20), 2338.8)).toBeLessThan(0.004)
  })
})

describe('a leak over time', () => {
  const day = 86_400_000
  const leak: LeakSpec = { part: 'head-1', kind: 'laminar', flowPaM3PerS: 1e-3 }
  const factor = (extra: Partial<LeakSpec>, at: number, condition = freshCondition()) =>
    leakFactorAt({ ...leak, ...extra }, condition, at)

  it('steps, doubles, opens in spans and is cured', () => {
    expect(factor({ onsetAt: 100 }, 99)).toBe(0)
    expect(factor({ onsetAt: 100 }, 100)).toBe(1)
    expect(factor({ growsFrom: 0, doublingDays: 10 }, 20 * day)).toBeCloseTo(4, 12)
    expect(factor({ growsFrom: 0, doublingDays: 1, growthLimit: 8 }, 20 * day)).toBe(8)
    expect(factor({ steps: [{ at: 5, factor: 4 }] }, 4)).toBe(1)
    expect(factor({ steps: [{ at: 5, factor: 4 }] }, 5)).toBe(4)
    expect(factor({ openSpans: [{ from: 5, to: 7 }] }, 7)).toBe(0)
    expect(factor({ openSpans: [{ from: 5, to: 7 }] }, 6)).toBe(1)
    expect(factor({ curedAt: 10, curedTo: 0.1 }, 10)).toBeCloseTo(0.1, 12)
  })

  it('passes a thirtieth while wet and dries to the whole', () => {
    const wetting = { wetShare: 1 / 30, wetSeconds: 600, dryingSeconds: 1200 }
    const condition = { seat: 1, wettedAt: 0, wetSeconds: 600 }
    expect(factor({ wetting }, 599_000, condition)).toBeCloseTo(1 / 30, 12)
    expect(factor({ wetting }, 1_800_000, condition)).toBeCloseTo(1 - (29 / 30) * Math.exp(-1), 12)
    expect(factor({ wetting }, 1e10, condition)).toBeCloseTo(1, 9)
  })
})

it('a pump moves less with vacuum, low voltage and wear, and nothing when flat out', () => {
  const pump = { displacementM3PerS: 2e-4, flatOutPa: 70_000, nominalV: 12, amps: 6, wear: [] }
  expect(pumpingSpeed(pump, 0, 12, 1)).toBe(2e-4)
  expect(pumpingSpeed(pump, 35_000, 12, 1)).toBeCloseTo(1e-4, 12)
  expect(pumpingSpeed(pump, 35_000, 11, 0.8)).toBeCloseTo(1e-4 * (11 / 12) * 0.8, 12)
  expect(pumpingSpeed(pump, 80_000, 12, 1)).toBe(0)
})

it('weather is a function of time alone, warmest in the afternoon of the place', () => {
  const spec = { meanC: 18, dailyC: 4, wanderC: 1, meanBarometerPa: 101_325, synopticPa: 500 }
  const one = weatherOf(spec, 7, 3600)
  const two = weatherOf(spec, 7, 3600)
  const at = Date.UTC(2026, 5, 10, 3, 17)
  two.airC(at + 1e9)
  expect(two.airC(at)).toBe(one.airC(at))
  const calm = weatherOf({ ...spec, wanderC: 0 }, 7, 3600)
  expect(calm.airC(Date.UTC(2026, 5, 10, 14))).toBeCloseTo(22, 9)
  const pressures = Array.from({ length: 400 }, (_, i) => one.barometerPa(at + i * 6 * 3_600_000))
  const mean = pressures.reduce((sum, each) => sum + each, 0) / pressures.length
  const deviation = Math.sqrt(pressures.reduce((sum, each) => sum + (each - mean) ** 2, 0) / pressures.length)
  expect(Math.abs(mean - 101_325)).toBeLessThan(150)
  expect(deviation).toBeGreaterThan(300)
  expect(deviation).toBeLessThan(700)
})
