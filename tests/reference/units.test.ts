import { describe, expect, test } from 'vitest'
import * as units from '@/shared/units'
import { expectNear } from './near'

const SP811 = 'NIST SP 811 (2008) appendix B.8/B.9, exact value from its definition'

describe(SP811, () => {
  test.each([
    ['inHg', 3386.388640341, 3386.389],
    ['mmHg', 133.322387415, 133.3224],
    ['torr', 133.32236842105263, 133.3224],
    ['psi', 6894.757293168361, 6894.757],
    ['inH2O', 249.08891, 249.0889],
    ['atm', 101325, 101325],
    ['bar', 100000, 100000],
    ['mbar', 100, 100],
    ['hPa', 100, 100],
    ['kPa', 1000, 1000],
  ] as const)('one %s in Pa', (unit, exact, printed) => {
    expectNear(units.toPa(1, unit), exact, 1e-12)
    expectNear(units.toPa(1, unit), printed, 5e-7)
    expectNear(units.fromPa(units.toPa(7.3, unit), unit), 7.3, 1e-14)
  })

  test.each([
    ['usGal', 3.785411784, 3.785412],
    ['impGal', 4.54609, 4.54609],
  ] as const)('one %s in litres', (unit, exact, printed) => {
    expectNear(units.fromM3(units.toM3(1, unit), 'L'), exact, 1e-12)
    expectNear(units.fromM3(units.toM3(1, unit), 'L'), printed, 5e-7)
  })

  test('one cubic foot a minute in L/s', () => {
    expectNear(units.fromM3PerSecond(units.toM3PerSecond(1, 'cfm'), 'L/s'), 0.4719474432, 1e-12)
  })

  test('ours is the conventional inch of mercury, neither the 60 °F nor the 32 °F one', () => {
    expect(Math.abs(units.PA_PER_INHG - 3376.85)).toBeGreaterThan(9)
    expect(Math.abs(units.PA_PER_INHG - 3386.38)).toBeGreaterThan(0.008)
  })

  test.each([
    [32, 0, 273.15],
    [59, 15, 288.15],
    [68, 20, 293.15],
    [98.6, 37, 310.15],
    [212, 100, 373.15],
    [-40, -40, 233.15],
  ])('%s °F (SP 811 B.8, formula from memory)', (fahrenheit, celsius, kelvin) => {
    expect(units.toCelsius(fahrenheit, 'F')).toBeCloseTo(celsius, 9)
    expect(units.celsiusToKelvin(units.toCelsius(fahrenheit, 'F'))).toBeCloseTo(kelvin, 9)
    expect(units.fromCelsius(celsius, 'F')).toBeCloseTo(fahrenheit, 9)
  })

  test('one atmosphere in all units', () => {
    expectNear(units.fromPa(101325, 'inHg'), 29.921255579748475, 1e-10)
    expectNear(units.fromPa(101325, 'mmHg'), 759.9998917256113, 1e-10)
    expectNear(units.fromPa(101325, 'torr'), 760, 1e-10)
    expectNear(units.fromPa(101325, 'psi'), 14.695948775513449, 1e-10)
    expectNear(units.fromPa(101325, 'hPa'), 1013.25, 1e-10)
    expectNear(units.fromPa(101325, 'kPa'), 101.325, 1e-10)
  })
})

test('40 CFR 1065.640(a) example 1: 29.9213 inHg is 101325 Pa', () => {
  expectNear(units.toPa(29.9213, 'inHg'), 101325.15042423517, 1e-12)
  expectNear(units.toPa(29.9213, 'inHg'), 101325, 2e-6)
})

describe('leak flow: exact from atm = 101325 Pa and torr = atm/760, sccm at 0 °C and one atmosphere', () => {
  test.each([
    ['mbar.L/s', 10, 1e-12],
    ['sccm', 592.1539600296077, 1e-12],
    ['torr.L/s', 7.500616827041697, 1e-12],
  ] as const)('one Pa·m³/s in %s', (unit, expected, tolerance) => {
    expectNear(units.fromPaM3PerSecond(1, unit), expected, tolerance)
  })

  test('others', () => {
    const convert = (value: number, from: units.LeakFlowUnit, to: units.LeakFlowUnit) =>
      units.fromPaM3PerSecond(units.toPaM3PerSecond(value, from), to)
    expectNear(convert(1, 'atm.cm3/s', 'Pa.m3/s'), 0.101325, 1e-12)
    expectNear(convert(1, 'atm.cm3/s', 'mbar.L/s'), 1.01325, 1e-12)
    expectNear(convert(1, 'sccm', 'Pa.m3/s'), 0.00168875, 1e-12)
    expectNear(convert(1, 'sccm', 'mbar.L/s'), 0.0168875, 1e-12)
    expectNear(convert(1, 'torr.L/s', 'mbar.L/s'), 1.3332236842105263, 1e-12)
    // One mbar in one second in one litre is one mbar·L/s, by definition.
    expectNear(convert(1, 'mbar.L/s', 'Pa.m3/s'), 0.1, 1e-12)
    expectNear(convert(1, 'mbar.L/s', 'torr.L/s'), 0.7500616827041697, 1e-12)
    expectNear(convert(1, 'mbar.L/s', 'atm.cm3/s'), 0.9869232667160128, 1e-12)
    expectNear(convert(1, 'mbar.L/s', 'sccm'), 59.21539600296077, 1e-12)
    // A printed three-digit table: 0.987 cm³/s, 59.2 cm³/min, 0.75 torr·L/s; cm³/min 0.0169 mbar·L/s.
    expectNear(convert(1, 'mbar.L/s', 'atm.cm3/s'), 0.987, 5e-3)
    expectNear(convert(1, 'sccm', 'mbar.L/s'), 0.0169, 5e-3)
  })

  test('a pV flow needs a temperature: one sccm at 0 and at 20 °C', () => {
    expectNear(units.sccmToPaM3PerSecond(1), 0.001689, 5e-4)
    expectNear(units.sccmToPaM3PerSecond(1, 20), 0.001812, 5e-4)
  })
})
