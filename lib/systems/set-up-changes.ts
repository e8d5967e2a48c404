import type { LogRow } from '@/db/queries/audit'
import type { SetUpChange, SetUpEntry } from '@/shared/schemas'

type Values = Record<string, unknown>
type Scalar = string | number | null

const isValues = (value: unknown): value is Values =>
  typeof value === 'object' && value !== null && !Array.isArray(value)
const FIGURES = [
  'kind',
  'cutOutPa',
  'cutInPa',
  'limitSeconds',
  'aimSeconds',
  'silenceSeconds',
  'pumpAmps',
  'lowSupplyV',
  'name',
]
const BOAT = ['name', 'timeZone', 'quietHours', 'altitudeM', 'harbour', 'berth']
const OF_PART = ['name', 'kind', 'volumeM3', 'parent']

const isMoment = (value: Values): value is { start: string; end: string } =>
  typeof value.start === 'string' && typeof value.end === 'string'

/** What stands in one line: quiet hours as "22:00 to 07:00". */
function scalar(value: unknown): Scalar {
  if (typeof value === 'string' || typeof value === 'number') return value
  return isValues(value) && isMoment(value) ? `${value.start} to ${value.end}` : null
}

/** Pressures come back from storage in single precision, so less than a tenth of a pascal is no change. */
const isSame = (a: Scalar, b: Scalar): boolean =>
  typeof a === 'number' && typeof b === 'number'
    ? Math.abs(a - b) <= 1e-6 * Math.max(Math.abs(a), Math.abs(b)) ||
      (Math.abs(a) > 1000 && Math.abs(a - b) < 0.1)
    : a === b

function fieldChanges(detail: Values, fields: readonly string[], part: string | null): SetUpChange[] {
  const before = isValues(detail.before) ? detail.before : {}
  return fields.flatMap((field): SetUpChange[] => {
    if (!(field in detail)) return []
    const to = scalar(detail[field])
    if (!(field in before)) return [{ field, part, to }]
    const from = scalar(before[field])
    return isSame(from, to) ? [] : [{ field, part, from, to }]
  })
}

const partsOf = (value: unknown): Map<string, Values> =>
  new Map(
    (Array.isArray(value) ? value : [])
      .filter(isValues)
      .flatMap((part) => (typeof part.key === 'string' ? [[part.key, part] as const] : [])),
  )

/** Between two drawings: parts added, removed, and what became different of those that stayed. */
export function partChanges(detail: Values): SetUpChange[] {
  const after = partsOf(detail.parts)
  const isKnown = Array.isArray(detail.before)
  const before = partsOf(detail.before)
  const nameOf = (key: unknown): Scalar =>
    typeof key === 'string' ? scalar((after.get(key) ?? before.get(key))?.name ?? key) : null
  const said = (part: Values): Values => ({
    name: part.name,
    kind: part.kind,
    volumeM3: part.volumeM3 ?? null,
    parent: nameOf(part.parent),
  })
  const added = [...after].flatMap(([key, part]): SetUpChange[] => {
    const name = String(scalar(part.name) ?? key)
    const was = before.get(key)
    if (was !== undefined) return fieldChanges({ ...said(part), before: said(was) }, OF_PART, name)
    return [{ field: 'part', part: name, ...(isKnown ? { from: null } : {}), to: name }]
  })
  const removed = [...before].flatMap(([key, part]): SetUpChange[] => {
    if (after.has(key)) return []
    const name = String(scalar(part.name) ?? key)
    return [{ field: 'part', part: name, from: name, to: null }]
  })
  return [...added, ...removed]
}

/** One line of the trail as what it changed from and to; null where it changed nothing. */
export function setUpEntry(row: LogRow, who: string | null): SetUpEntry | null {
  const isParts = row.action === 'system.parts'
  const isBoat = row.action === 'vessel.changed'
  const changes = isParts ? partChanges(row.detail) : fieldChanges(row.detail, isBoat ? BOAT : FIGURES, null)
  if (changes.length === 0) return null
  const dated = row.detail.inForceFrom
  return {
    id: row.id,
    at: row.at.toISOString(),
    who,
    subject: isParts ? 'parts' : isBoat ? 'boat' : 'figures',
    inForceFrom: typeof dated === 'string' ? new Date(dated).toISOString() : null,
    changes,
  }
}
