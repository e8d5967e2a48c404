import { fromCelsius, fromM3, fromPa, toCelsius, toM3, toPa, type UnitChoice } from '@/shared/units'

/** What stands in the form: text as typed, in the units it was typed in. */
export type LeakDownFields = {
  first: string
  second: string
  minutes: string
  gauge: 'dial' | 'digital' | 'logger'
  differential: string
  airFirst: string
  airSecond: string
  barometerFirst: string
  barometerSecond: string
  volume: string
}

/** Readings as they are reckoned with, SI throughout. */
export type Readings = {
  startPa: number
  endPa: number
  seconds: number
  resolutionPa: number
  differentialPa: number
  airStartCel?: number
  airEndCel?: number
  barometerStartPa?: number
  barometerEndPa?: number
  volumeM3?: number
}

/** What each kind of gauge can be read to, Pa. */
export type Resolutions = Record<LeakDownFields['gauge'], number>

/** A number as people write it, decimal comma and true minus sign included; null when it is none. */
export function numberOf(text: string): number | null {
  const plain = text.trim().replace(',', '.').replace('−', '-')
  if (plain === '') return null
  const value = Number(plain)
  return Number.isFinite(value) ? value : null
}

/** The example that the page opens with, in the reader's units. */
export function exampleFields(units: UnitChoice): LeakDownFields {
  const inUnit = (inHg: number) => shortest(fromPa(toPa(inHg, 'inHg'), units.vacuum))
  return {
    first: inUnit(9.9),
    second: inUnit(9.4),
    minutes: '30',
    gauge: 'digital',
    differential: inUnit(1.8),
    airFirst: '',
    airSecond: '',
    barometerFirst: '',
    barometerSecond: '',
    volume: '',
  }
}

/** Five figures at most, so that going to another unit and back moves no gauge; no trailing noughts. */
const shortest = (value: number): string => String(Number(value.toPrecision(5)))

/** The same fields in other units, so that a change of unit loses nothing that was typed. */
export function convertFields(fields: LeakDownFields, from: UnitChoice, to: UnitChoice): LeakDownFields {
  const each = (text: string, change: (value: number) => number) => {
    const value = numberOf(text)
    return value === null ? text : shortest(change(value))
  }
  const vacuum = (value: number) => fromPa(toPa(value, from.vacuum), to.vacuum)
  const air = (value: number) => fromCelsius(toCelsius(value, from.temperature), to.temperature)
  const volume = (value: number) => fromM3(toM3(value, from.volume), to.volume)
  return {
    ...fields,
    first: from.vacuum === to.vacuum ? fields.first : each(fields.first, vacuum),
    second: from.vacuum === to.vacuum ? fields.second : each(fields.second, vacuum),
    differential: from.vacuum === to.vacuum ? fields.differential : each(fields.differential, vacuum),
    airFirst: from.temperature === to.temperature ? fields.airFirst : each(fields.airFirst, air),
    airSecond: from.temperature === to.temperature ? fields.airSecond : each(fields.airSecond, air),
    volume: from.volume === to.volume ? fields.volume : each(fields.volume, volume),
  }
}

/** Which field is not right and why, for the reader; empty when the readings can be reckoned with. */
export type FieldTroubles = Partial<Record<keyof LeakDownFields, string>>

export function readingsOf(
  fields: LeakDownFields,
  units: UnitChoice,
  resolutions: Resolutions,
): { readings: Readings | null; troubles: FieldTroubles } {
  const troubles: FieldTroubles = {}
  const needed = (key: 'first' | 'second' | 'minutes' | 'differential', what: string): number => {
    const value = numberOf(fields[key])
    if (value === null) troubles[key] = `Write ${what} as a number.`
    return value ?? Number.NaN
  }
  const optional = (key: 'airFirst' | 'airSecond' | 'barometerFirst' | 'barometerSecond' | 'volume') => {
    const value = numberOf(fields[key])
    if (value === null && fields[key].trim() !== '') troubles[key] = 'Write a number, or leave it empty.'
    return value ?? undefined
  }
  const first = needed('first', 'the first reading')
  const second = needed('second', 'the second reading')
  const minutes = needed('minutes', 'the minutes between the readings')
  const differential = needed('differential', 'the difference between stop and start')
  if (minutes <= 0) troubles.minutes = 'Some time has to pass between the readings.'
  if (differential <= 0) troubles.differential = 'The pump stops at more vacuum than it starts at.'
  if (toPa(first, units.vacuum) > 101_325) troubles.first = 'That is more vacuum than there is air.'
  const celsius = (value: number | undefined) =>
    value === undefined ? undefined : toCelsius(value, units.temperature)
  const pascal = (value: number | undefined) => (value === undefined ? undefined : value * 100)
  const volume = optional('volume')
  const readings: Readings = {
    startPa: toPa(first, units.vacuum),
    endPa: toPa(second, units.vacuum),
    seconds: minutes * 60,
    resolutionPa: resolutions[fields.gauge],
    differentialPa: toPa(differential, units.vacuum),
    airStartCel: celsius(optional('airFirst')),
    airEndCel: celsius(optional('airSecond')),
    barometerStartPa: pascal(optional('barometerFirst')),
    barometerEndPa: pascal(optional('barometerSecond')),
    volumeM3: volume === undefined || volume <= 0 ? undefined : toM3(volume, units.volume),
  }
  return Object.keys(troubles).length > 0 ? { readings: null, troubles } : { readings, troubles }
}
