import type { SimSample } from '@/simulator/logger'

/**
 * A SenML JSON pack (RFC 8428) of one logger's samples. The base time is the first sample's; relative times
 * carry milliseconds. Units: Pa, Cel, V; the pump as a boolean. A sample without any channel is left out.
 * @throws RangeError without samples.
 */
export function toSenml(serial: string, samples: readonly SimSample[]): string {
  const [first] = samples
  if (!first) throw new RangeError('An upload needs at least one sample.')
  const baseSeconds = Math.floor(first.at / 1000)
  const records: string[] = []
  const add = (at: number, name: string, rest: string): void => {
    const seconds = Math.round(at - baseSeconds * 1000) / 1000
    const base = records.length === 0 ? `"bn":${JSON.stringify(`${serial}:`)},"bt":${baseSeconds},` : ''
    records.push(`{${base}"n":"${name}"${seconds === 0 ? '' : `,"t":${seconds}`},${rest}}`)
  }
  for (const { at, pumpOn, vacuumPa, airC, barometerPa, supplyV } of samples) {
    if (pumpOn !== null) add(at, 'pump', `"vb":${pumpOn}`)
    if (vacuumPa !== null) add(at, 'vacuum', `"u":"Pa","v":${vacuumPa}`)
    if (airC !== null) add(at, 'air', `"u":"Cel","v":${airC}`)
    if (barometerPa !== null) add(at, 'barometer', `"u":"Pa","v":${barometerPa}`)
    if (supplyV !== null) add(at, 'supply', `"u":"V","v":${supplyV}`)
  }
  return `[${records.join(',\n')}]`
}
