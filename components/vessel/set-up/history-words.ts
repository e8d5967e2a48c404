import type { SetUpChange } from '@/shared/schemas'
import { formatDuration, formatVacuum, formatVolume, type UnitChoice } from '@/shared/units'
import { KINDS } from './figure-values'

const NAMES: Record<string, string> = {
  kind: 'kind',
  cutOutPa: 'pump stops at',
  cutInPa: 'pump starts at',
  limitSeconds: 'limit',
  aimSeconds: 'aim',
  silenceSeconds: 'unheard after',
  pumpAmps: 'pump current',
  lowSupplyV: 'low supply under',
  name: 'name',
  timeZone: 'time zone',
  quietHours: 'quiet hours',
  altitudeM: 'altitude',
  harbour: 'harbour',
  berth: 'berth',
  volumeM3: 'volume',
  parent: 'leads to',
}
const isKind = (value: string): value is keyof typeof KINDS => value in KINDS

function valueWords(field: string, value: string | number | null, units: UnitChoice): string {
  if (field === 'cutOutPa' || field === 'cutInPa')
    return typeof value === 'number' ? formatVacuum(value, units.vacuum) : 'left to the record'
  if (value === null || value === '') return 'nothing'
  if (typeof value === 'string')
    return field === 'kind' && isKind(value) ? KINDS[value].word.toLowerCase() : value
  if (field === 'volumeM3') return formatVolume(value, units.volume)
  if (field.endsWith('Seconds')) return formatDuration(value)
  if (field === 'pumpAmps') return `${value} A`
  if (field === 'lowSupplyV') return `${value} V`
  return field === 'altitudeM' ? `${Math.round(value)} m` : String(value)
}

/** One change as a line: "limit: 3 h → 4 h", "Forward head: added". Without what it was, where nobody wrote it down. */
export function changeWords(change: SetUpChange, units: UnitChoice): string {
  if (change.field === 'part') {
    const what = change.to === null ? 'removed' : change.from === undefined ? 'drawn' : 'added'
    return `${change.part ?? ''}: ${what}`
  }
  const of = change.part === null ? '' : `${change.part}, `
  const name = NAMES[change.field] ?? change.field
  const to = valueWords(change.field, change.to, units)
  return change.from === undefined
    ? `${of}${name}: → ${to}`
    : `${of}${name}: ${valueWords(change.field, change.from, units)} → ${to}`
}
