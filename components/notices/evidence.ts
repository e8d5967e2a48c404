import { formatDuration, formatRate, formatVacuum, type VacuumUnit } from '@/shared/units'

export type EvidenceLine = { name: string; value: string }

/** `holdSeconds` → "hold": the last capital word is the unit, what stands before it the name. */
function nameOf(key: string): string {
  const words = key
    .replace(/([A-Z])/g, ' $1')
    .toLowerCase()
    .trim()
    .split(' ')
  const name = words.join(' ').replace(/ (seconds|pa per hour|pa per second|pa|cel|c|v|at)$/, '')
  return name.charAt(0).toUpperCase() + name.slice(1)
}

function valueOf(key: string, value: number, unit: VacuumUnit): string {
  if (/seconds$/i.test(key)) return formatDuration(value)
  if (/PaPerHour$/.test(key)) return formatRate(value, unit)
  if (/PaPerSecond$/.test(key)) return `${formatVacuum(value, unit, 3)}/s`
  if (/Pa$/.test(key)) return formatVacuum(value, unit)
  if (/(Cel|airC)$/.test(key)) return `${value.toFixed(1)} °C`
  if (/V$/.test(key)) return `${value.toFixed(1)} V`
  if (/chance|probability|share/i.test(key)) return `${Math.round(value * 100)} %`
  return String(Math.round(value * 100) / 100)
}

/**
 * What a notice rests on, as lines with units. Units are read from the ends of the keys, as everywhere on the
 * wire; what is neither a number nor a text is left to the record.
 */
export function evidenceLines(evidence: Record<string, unknown>, unit: VacuumUnit): EvidenceLine[] {
  return Object.entries(evidence).flatMap(([key, value]) => {
    if (typeof value === 'number' && Number.isFinite(value))
      return [{ name: nameOf(key), value: valueOf(key, value, unit) }]
    if (typeof value === 'string' && value !== '' && Number.isNaN(Date.parse(value)))
      return [{ name: nameOf(key), value }]
    return []
  })
}
