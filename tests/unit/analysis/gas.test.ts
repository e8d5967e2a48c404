import { describe, expect, test } from 'vitest'
import * as gas from '@/lib/analysis/gas'
import { inHgToPa } from '@/shared/units'

describe('compensation', () => {
  test('a sealed dry system reads the same through warmth and weather', () => {
    const at20 = { vacuumPa: inHgToPa(10), barometerPa: 101_325, gasTempC: 20 }
    const insidePa = gas.pressureAfterTemperaturePa(101_325 - inHgToPa(10), 20, 31)
    const at31 = { vacuumPa: 99_000 - insidePa, barometerPa: 99_000, gasTempC: 31 }
    const dry = { vapourFraction: 0 }
    expect(gas.compensatedPressurePa(at31, dry)).toBeCloseTo(gas.compensatedPressurePa(at20, dry), 6)
  })

  test('so does a wet one whose vapour is taken off', () => {
    const dryPa = (celsius: number) => gas.pressureAfterTemperaturePa(60_000, 20, celsius)
    const reading = (celsius: number) => ({
      vacuumPa: 101_325 - dryPa(celsius) - gas.saturationVapourPressurePa(celsius),
      barometerPa: 101_325,
      gasTempC: celsius,
    })
    const wet = { vapourFraction: 1 }
    expect(gas.compensatedPressurePa(reading(28), wet)).toBeCloseTo(60_000, 6)
    expect(gas.compensatedPressurePa(reading(12), wet)).toBeCloseTo(60_000, 6)
  })

  test('without channels the ambient is the standard pressure of the place, and nothing is reduced', () => {
    expect(gas.compensatedPressurePa({ vacuumPa: 30_000, barometerPa: null, gasTempC: null })).toBe(71_325)
    const inHills = { standardPressurePa: gas.standardPressurePa(500) }
    expect(gas.compensatedPressurePa({ vacuumPa: 30_000 }, inHills)).toBeCloseTo(65_460.8, 1)
  })

  test('says what a stretch was corrected for', () => {
    const both = { vacuumPa: 1, barometerPa: 101_325, gasTempC: 20 }
    expect(gas.compensationOf([both, both])).toBe('full')
    expect(gas.compensationOf([both, { ...both, barometerPa: null }])).toBe('temperature')
    expect(gas.compensationOf([both, { ...both, gasTempC: null }])).toBe('barometer')
    expect(gas.compensationOf([])).toBe('none')
  })

  test('vapour pressure at the boiling point and at body warmth', () => {
    expect(gas.saturationVapourPressurePa(100) / 101_325).toBeCloseTo(1, 3)
    expect(gas.saturationVapourPressurePa(20)).toBeCloseTo(2338.3, 0)
    expect(gas.saturationVapourPressurePa(NaN)).toBeNaN()
  })
})

describe('temperature lag', () => {
  const at = (hours: number, airC: number | null) => ({ atSeconds: hours * 3600, airC })

  test('a step is followed by 63 % in one time constant', () => {
    const points = [at(0, 20), at(0.0001, 30), at(1.0001, 30)]
    expect(gas.lagTemperature(points, 3600)[2]).toBeCloseTo(20 + 10 * (1 - Math.exp(-1)), 2)
  })

  test('a steady ramp is followed one time constant behind, however it is sampled', () => {
    const ramp = (step: number) =>
      gas
        .lagTemperature(
          Array.from({ length: 20 / step + 1 }, (_, i) => at(i * step, i * step)),
          3600,
        )
        .at(-1)
    expect(ramp(1)).toBeCloseTo(19, 6)
    expect(ramp(0.25)).toBeCloseTo(19, 6)
  })

  test('gaps hold the last value; before the first it is unknown; no constant gives the air; nothing gives nothing', () => {
    expect(gas.lagTemperature([at(0, null), at(1, 20), at(2, null), at(3, NaN)], 3600)).toEqual([
      null,
      20,
      20,
      20,
    ])
    expect(gas.lagTemperature([at(0, 20), at(1, 30)], 0)).toEqual([20, 30])
    expect(gas.lagTemperature([], 3600)).toEqual([])
    expect(gas.lagTemperature([at(0, 20)], 3600, 10)).toEqual([10])
  })
})

describe('leaks', () => {
  test('nothing flows where inside is not lower', () => {
    expect(gas.orificeMassFlow(1, { upstreamPa: 100, downstreamPa: 100 })).toBe(0)
    expect(gas.laminarDrive(100, 120)).toBe(0)
    expect(gas.equivalentHoleDiameterM(0.01, { upstreamPa: 100, downstreamPa: 100 })).toBeNull()
    expect(gas.equivalentHoleDiameterM(-1, { upstreamPa: 100, downstreamPa: 50 })).toBe(0)
  })

  test('a capillary carries as the fourth power of its width', () => {
    const flow = (diameterM: number) => gas.capillaryLeakFlow(diameterM, 0.01, 101_325, 67_000)
    expect(flow(2e-5) / flow(1e-5)).toBeCloseTo(16, 9)
  })

  test('rate and flow are one another by the volume', () => {
    expect(gas.rateOfFlow(gas.flowOfRate(2032, 0.04), 0.04)).toBeCloseTo(2032, 9)
    expect(gas.flowOfMolPerS(gas.molPerSOfFlow(0.3))).toBeCloseTo(0.3, 12)
  })

  test('no hold time where nothing is lost', () => {
    expect(gas.holdSecondsAtRate(6000, 0)).toBeNull()
    expect(gas.holdSecondsAtRate(6000, -10)).toBeNull()
    expect(gas.holdSecondsAtRate(6000, 2000)).toBe(10_800)
  })

  test.each([
    [0, 'no hole to speak of'],
    [3e-5, 'thinner than a hair'],
    [8e-5, 'about as thick as a hair'],
    [0.01, 'wider than a pencil lead'],
    [null, 'of unknown size'],
  ])('a hole of %s m in words', (diameterM, words) => {
    expect(gas.holeInWords(diameterM)).toBe(words)
  })
})

describe('volume', () => {
  test('from parts, and from a syringe by Boyle', () => {
    expect(gas.volumeOfPartsM3([0.03], [{ innerDiameterM: 0.038, lengthM: 4 }])).toBeCloseTo(0.034536, 5)
    expect(gas.volumeOfPartsM3([], [])).toBe(0)
    expect(gas.volumeBySyringeM3(1e-4, 101_325 / 400)).toBeCloseTo(0.04, 12)
    expect(gas.volumeBySyringeM3(1e-4, 0)).toBeNull()
  })
})
