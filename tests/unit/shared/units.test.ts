import { describe, expect, test } from 'vitest'
import * as units from '@/shared/units'

describe('figures for a reader', () => {
  test.each([
    [33_863.9, 'inHg', '10.0 inHg'],
    [33_863.9, 'kPa', '33.9 kPa'],
    [33_863.9, 'mbar', '339 mbar'],
    [-100, 'inHg', '0.0 inHg'],
    [-1000, 'inHg', '−0.3 inHg'],
    [null, 'inHg', '–'],
    [NaN, 'inHg', '–'],
  ] as const)('vacuum of %s Pa in %s', (pa, unit, text) => {
    expect(units.formatVacuum(pa, unit)).toBe(text)
  })

  test.each([
    [2031.83, 'inHg', '0.60 inHg/h'],
    [20, 'inHg', '0.006 inHg/h'],
    [2031.83, 'kPa', '2.03 kPa/h'],
    [2031.83, 'mbar', '20.3 mbar/h'],
    [0, 'inHg', '0.00 inHg/h'],
    [undefined, 'mbar', '–'],
  ] as const)('leak rate of %s Pa/h in %s', (paPerHour, unit, text) => {
    expect(units.formatRate(paPerHour, unit)).toBe(text)
  })

  test('a change of rate', () => {
    expect(units.formatRateRange(372.5, 1523.9, 'inHg')).toBe('0.11 to 0.45 inHg/h')
  })

  test.each([
    [0, '0 s'],
    [45, '45 s'],
    [89, '89 s'],
    [150, '3 min'],
    [41 * 60, '41 min'],
    [59.6 * 60, '1 h'],
    [2.2 * 3600, '2.2 h'],
    [8 * 3600, '8 h'],
    [14.3 * 3600, '14 h'],
    [3 * 86_400, '3 days'],
    [Infinity, '–'],
    [null, '–'],
  ])('%s s in words', (seconds, text) => {
    expect(units.formatDuration(seconds)).toBe(text)
  })

  test('a span of time in the unit of its longer end, or a bound', () => {
    expect(units.formatDurationRange(7600, 8600)).toBe('2.1 to 2.4 h')
    expect(units.formatDurationRange(50_400, null)).toBe('at least 14 h')
    expect(units.formatDurationRange(null, 3600)).toBe('–')
  })

  test('temperature, volume, leak flow, barometer, share', () => {
    expect(units.formatTemperature(20, 'F')).toBe('68 °F')
    expect(units.formatTemperature(-4.6, 'C')).toBe('−5 °C')
    expect(units.formatVolume(0.04, 'L')).toBe('40 L')
    expect(units.formatVolume(0.0379, 'usGal')).toBe('10 US gal')
    expect(units.formatLeakFlow(0.01)).toBe('0.36 L of air an hour')
    expect(units.formatLeakFlow(0.01, 'Pa.m3/s')).toBe('0.010 Pa·m³/s')
    expect(units.formatBarometer(101_325)).toBe('1013 hPa')
    expect(units.formatShare(0.634)).toBe('63 %')
  })
})
