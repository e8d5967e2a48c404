import { describe, expect, test } from 'vitest'
import * as gas from '@/lib/analysis/gas'
import { inHgToPa, paToInHg, toPa } from '@/shared/units'
import { expectNear } from './near'

describe('ISO 2533:1975 / ICAO Doc 7488 standard atmosphere (constants: value from memory)', () => {
  test.each([
    [0, 1013.25, 29.92126],
    [100, 1001.294377, 29.56821],
    [500, 954.608353, 28.18957],
    [1000, 898.745629, 26.53994],
    [1500, 845.559941, 24.96937],
    [2000, 794.952019, 23.47492],
    [3000, 701.085265, 20.70304],
  ])('%s m geopotential', (altitudeM, hPa, inHg) => {
    expectNear(gas.standardPressurePa(altitudeM), hPa * 100, 1e-8)
    expectNear(paToInHg(gas.standardPressurePa(altitudeM)), inHg, 5e-7)
  })

  test('898.746 hPa at 1000 m and 794.952 hPa at 2000 m as printed', () => {
    expect(gas.standardPressurePa(1000) / 100).toBeCloseTo(898.746, 2)
    expect(gas.standardPressurePa(2000) / 100).toBeCloseTo(794.952, 2)
  })
})

test('ISO 2533:1975: geometric and geopotential altitude differ by 12.6 Pa at 3000 m, under 2 Pa where boats are', () => {
  const geopotential = (geometricM: number) => (6_356_766 * geometricM) / (6_356_766 + geometricM)
  const difference = (altitudeM: number) =>
    gas.standardPressurePa(geopotential(altitudeM)) - gas.standardPressurePa(altitudeM)
  expect(difference(3000)).toBeCloseTo(12.618, 2)
  expect(difference(1000)).toBeLessThan(2)
})

describe('ideal gas', () => {
  test('OpenStax College Physics ch. 13 problem 22: a tyre cooled from 35 to −40 °C', () => {
    const gaugePa = gas.pressureAfterTemperaturePa(250000 + 101325, 35, -40) - 101325
    expectNear(gaugePa, 164491.725, 1e-8)
    expectNear(gaugePa, 164000, 5e-3)
  })

  test('p/T constant: 50 kPa from 20 to 25 °C', () => {
    expectNear(gas.pressureAfterTemperaturePa(50000, 20, 25), 50852.80573085451, 1e-9)
    expectNear(gas.pressurePerKelvinPa(50000, 20), 170.56114617, 1e-9)
  })

  test('one kelvin at 16 inHg', () => {
    expectNear(gas.pressurePerKelvinPa(101325 - inHgToPa(16), 20), 160.8145377947945, 1e-9)
    expectNear(paToInHg(gas.pressurePerKelvinPa(101325 - inHgToPa(16), 20)), 0.04748850615639937, 1e-9)
  })

  test('a sealed volume while only the barometer falls by 20 hPa', () => {
    const absolutePa = gas.absolutePressurePa(inHgToPa(16), 101325)
    expectNear(absolutePa, 47142.781754544, 1e-9)
    const afterPa = 99325 - absolutePa
    expectNear(paToInHg(afterPa), 15.409400333979816, 1e-9)
    const before = gas.compensatedPressurePa({ vacuumPa: inHgToPa(16), barometerPa: 101325 })
    expectNear(gas.compensatedPressurePa({ vacuumPa: afterPa, barometerPa: 99325 }), before, 1e-12)
  })

  test('common practice, no source: 1 °C is 0.07 inHg at 10 inHg, 0.11 wet; 1 hPa of barometer 0.03 inHg', () => {
    const pressurePa = 101325 - inHgToPa(10)
    expect(paToInHg(gas.pressurePerKelvinPa(pressurePa, 20))).toBeCloseTo(0.07, 2)
    expect(paToInHg(gas.pressurePerKelvinPa(pressurePa, 20, 1))).toBeCloseTo(0.11, 2)
    expect(paToInHg(100)).toBeCloseTo(0.03, 2)
  })
})

describe('leak rate', () => {
  const start = { pressurePa: 25300, tempK: 293.15 }

  test('40 CFR 1065.644, Eq. 1065.644-1 (its printed answer 0.00030 mol/s: value from memory)', () => {
    const end = { pressurePa: 50600, tempK: 293.15 }
    expectNear(gas.vacuumDecayMolPerS(0.002, start, end, 70, 8.314472), 0.0002965704684639937, 1e-9)
    expectNear(gas.vacuumDecayMolPerS(0.002, start, end, 70), 0.0002965708031072312, 1e-9)
    expect(gas.vacuumDecayMolPerS(0.002, start, end, 70)).toBeCloseTo(0.0003, 5)
    expectNear(gas.leakFlowPaM3PerS(0.002, start, end, 70), 0.7228571428571429, 1e-9)
  })

  test('40 CFR 1065.644 with the gas 5 °C warmer at the end', () => {
    const end = { pressurePa: 50600, tempK: 298.15 }
    expectNear(gas.vacuumDecayMolPerS(0.002, start, end, 70, 8.314472), 0.0002866234462113023, 1e-9)
    const flow = gas.leakFlowPaM3PerS(
      0.002,
      { pressurePa: 25300, tempC: 20 },
      { pressurePa: 50600, tempC: 25 },
      70,
    )
    expectNear(gas.molPerSOfFlow(flow) * (8.31446261815324 / 8.314472), 0.0002866234462113023, 1e-9)
  })

  test('EN 1779:1999 technique D, ISO 20485, ASTM E2930 (formula: value from memory): 1 mbar in 1 s in 1 L', () => {
    expectNear(gas.leakFlowPaM3PerS(0.001, { pressurePa: 50000 }, { pressurePa: 50100 }, 1), 0.1, 1e-12)
  })

  test('molar forms with the SI of 2019', () => {
    expectNear(gas.molPerSOfFlow(1, 273.15), 0.000440316145131708, 1e-12)
    expectNear(gas.molPerSOfFlow(1), 0.000410275814575221, 1e-12)
    expectNear(gas.molPerSOfFlow(1, 296.15), 0.0004061197198808916, 1e-12)
    expectNear(gas.molPerSOfFlow(0.101325 / 60, 273.15), 7.435838900911718e-7, 1e-12)
    expectNear((gas.MOLAR_GAS_CONSTANT * 273.15 * 1000) / 101325, 22.413969545014137, 1e-12)
  })

  test('40 CFR 1065.640(a) example 1: 0.471948 m³/s of standard air is 19.619 mol/s', () => {
    const molPerS = gas.molPerSOfFlow(0.471948 * 101325) * (8.31446261815324 / 8.314472)
    expectNear(molPerS, 19.619421102046672, 1e-9)
    expectNear(molPerS, 19.619, 5e-5)
  })
})

describe('orifice flow', () => {
  test('critical pressure ratio (Anderson; White)', () => {
    expectNear(gas.criticalPressureRatio(1.4), 0.528281787717174, 1e-12)
    expectNear(gas.criticalPressureRatio(1.399), 0.5284502745713356, 1e-12)
    expectNear(gas.criticalPressureRatio(1.385), 0.5308213686816134, 1e-12)
  })

  test.each([
    [287, 0.04041841989408873],
    [287.05, 0.04041489958575328],
    [287.05287, 0.04041469754796885],
    [287.058, 0.04041433642177708],
  ])(
    'choked constant for R = %s (NASA Glenn mass-flow equation; 0.0404: value from memory)',
    (gasConstant, expected) => {
      const flow = gas.orificeMassFlow(1, { upstreamPa: 1e5, downstreamPa: 1e4, gasConstant })
      expectNear((flow * Math.sqrt(293.15)) / 1e5, expected, 1e-10)
      expectNear(gas.isentropicFlowFunction(0.1), 0.6847314563772704, 1e-10)
    },
  )

  test('40 CFR 1065.640 table "Cf for CFV", beta 0 (0.6846: value from memory)', () => {
    expectNear(gas.isentropicFlowFunction(0.1, 1.399), 0.6845625098853431, 1e-9)
  })

  // 1 mm hole, coefficient 1, out of 101325 Pa and 20 °C; derived from the isentropic formula.
  test.each([
    [67461.11359659, 0.000179800894405, 15.1301641453, 8348.137315, 8.959386615],
    [53915.559035226, 0.000187839509108, 15.8066099458, 8721.369381, 9.359946674],
    [47142.781754544, 0.000187845535426, 15.8071170578, 8721.649182, 9.360246962],
    [33597.22719318, 0.000187845535426, 15.8071170578, 8721.649182, 9.360246962],
    [90000, 0.000121692628302, 10.2403797688, 5650.176405, 6.063881432],
    [95000, 9.36346907205e-5, 7.87931697995, 4347.449206, 4.665768752],
    [100000, 4.40535912586e-5, 3.70708982921, 2045.40378, 2.195167923],
    [101000, 2.19346866647e-5, 1.84579398679, 1018.42528, 1.092994219],
  ])('1 mm into %s Pa', (downstreamPa, kgPerS, flow, sccm, litresPerMin) => {
    const conditions = { upstreamPa: 101325, downstreamPa, upstreamTempC: 20 }
    const area = gas.holeAreaM2(0.001)
    expectNear(gas.orificeMassFlow(area, conditions), kgPerS, 1e-8)
    expectNear(gas.orificeLeakFlow(area, conditions), flow, 1e-8)
    // Amount of gas counted at 0 °C.
    expectNear((gas.orificeLeakFlow(area, conditions) / 0.00168875) * (273.15 / 293.15), sccm, 1e-8)
    expectNear((gas.orificeLeakFlow(area, conditions) / 101325) * 60000, litresPerMin, 1e-8)
    expectNear(gas.equivalentHoleDiameterM(flow, { ...conditions, coefficient: 1 }), 0.001, 1e-8)
  })

  test('inflow chokes only for vacuum deeper than 14.1 inHg at one atmosphere', () => {
    expectNear(paToInHg(101325 * (1 - gas.criticalPressureRatio())), 14.114401191336603, 1e-9)
  })

  test('common practice, no source: from 10 to 8 inHg a laminar leak slows by 17 %, an orifice by 6 %', () => {
    expect(gas.rateScale('laminar', 101325, inHgToPa(10), inHgToPa(8))).toBeCloseTo(0.83, 2)
    expect(gas.rateScale('orifice', 101325, inHgToPa(10), inHgToPa(8))).toBeCloseTo(0.94, 2)
  })
})

describe('compressed-air handbook table "Discharge of air through an orifice", C = 1, free air at 14.7 psia and 70 °F (footnote constants: value from memory)', () => {
  const DIAMETERS_INCH = [1 / 64, 1 / 32, 1 / 16, 1 / 8, 1 / 4, 3 / 8, 1 / 2, 5 / 8, 3 / 4, 7 / 8, 1]
  // Gauge psi, then ft³/min for each diameter.
  const TABLE: [number, number[]][] = [
    [1, [0.028, 0.112, 0.45, 1.8, 7.18, 16.2, 28.7, 45.0, 64.7, 88.1, 115]],
    [2, [0.04, 0.158, 0.633, 2.53, 10.1, 22.8, 40.5, 63.3, 91.2, 124, 162]],
    [3, [0.048, 0.194, 0.775, 3.1, 12.4, 27.8, 49.5, 77.5, 111, 152, 198]],
    [5, [0.062, 0.248, 0.993, 3.97, 15.9, 35.7, 63.5, 99.3, 143, 195, 254]],
    [7, [0.073, 0.293, 1.17, 4.68, 18.7, 42.2, 75.0, 117, 168, 230, 300]],
    [9, [0.083, 0.331, 1.32, 5.3, 21.1, 47.7, 84.7, 132, 191, 260, 339]],
    [12, [0.095, 0.379, 1.52, 6.07, 24.3, 54.6, 97.0, 152, 218, 297, 388]],
    [15, [0.105, 0.42, 1.68, 6.72, 26.9, 60.5, 108, 168, 242, 329, 430]],
    [20, [0.123, 0.491, 1.96, 7.86, 31.4, 70.7, 126, 196, 283, 385, 503]],
    [50, [0.229, 0.916, 3.66, 14.7, 58.6, 132, 235, 366, 528, 718, 938]],
    [100, [0.406, 1.62, 6.49, 26.0, 104, 234, 415, 649, 934, 1272, 1661]],
    [125, [0.494, 1.98, 7.9, 31.6, 126, 284, 506, 790, 1138, 1549, 2023]],
  ]
  const DENSITY_KG_M3 = 0.07494 * 16.018463373960142
  test.each(TABLE)('%s psi', (gaugePsi, row) => {
    expect(row).toHaveLength(DIAMETERS_INCH.length)
    DIAMETERS_INCH.forEach((inches, index) => {
      const kgPerS = gas.orificeMassFlow(gas.holeAreaM2(inches * 0.0254), {
        upstreamPa: toPa(14.7 + gaugePsi, 'psi'),
        downstreamPa: toPa(14.7, 'psi'),
        upstreamTempC: 530 / 1.8 - 273.15,
      })
      const cubicFeetPerMinute = kgPerS / DENSITY_KG_M3 / (0.028316846592 / 60)
      expectNear(cubicFeetPerMinute, row[index] ?? NaN, index === 0 ? 0.015 : 0.007)
    })
  })
})
