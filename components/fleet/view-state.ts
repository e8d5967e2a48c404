import { rowName } from '@/components/fleet/fleet-words'
import { SORTS, type Sort } from '@/components/fleet/order'
import { stateOf, STATES, type SystemState } from '@/components/states'
import type { FleetRow } from '@/shared/schemas'

/** How the fleet is being looked at; all of it lives in the address, so that a link shows the same. */
export type FleetView = { find: string; states: SystemState[]; harbour: string; sort: Sort }

/** Reads an address's query; what is not understood is left out. */
export function parseView(query: URLSearchParams): FleetView {
  const states = (query.get('state') ?? '').split(',').flatMap((word) => stateOf(word) ?? [])
  return {
    find: query.get('find') ?? '',
    states: STATES.filter((state) => states.includes(state)),
    harbour: query.get('harbour') ?? '',
    sort: SORTS.find((sort) => sort === query.get('sort')) ?? 'worst',
  }
}

/** The query of a view, empty for the plain one. `viewQuery({ …, sort: 'name' }) // "?sort=name"` */
export function viewQuery(view: FleetView): string {
  const query = new URLSearchParams()
  if (view.find.trim() !== '') query.set('find', view.find)
  if (view.states.length > 0) query.set('state', view.states.join(','))
  if (view.harbour !== '') query.set('harbour', view.harbour)
  if (view.sort !== 'worst') query.set('sort', view.sort)
  const text = query.toString()
  return text === '' ? '' : `?${text}`
}

const folded = (text: string): string => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase()

/** Rows that answer to every word typed (boat, system, berth, harbour), in the harbour and states chosen. */
export function filterRows(rows: readonly FleetRow[], view: FleetView): FleetRow[] {
  const words = folded(view.find).split(/\s+/).filter(Boolean)
  return rows.filter((row) => {
    if (view.states.length > 0 && !view.states.includes(row.state)) return false
    if (view.harbour !== '' && row.harbour !== view.harbour) return false
    if (words.length === 0) return true
    const text = folded(`${rowName(row)} ${row.berth ?? ''} ${row.harbour ?? ''}`)
    return words.every((word) => text.includes(word))
  })
}

/** How many rows are in each state, in the order of the states; those with none are left out. */
export function countStates(rows: readonly FleetRow[]): { state: SystemState; count: number }[] {
  const counts = new Map<SystemState, number>()
  for (const row of rows) counts.set(row.state, (counts.get(row.state) ?? 0) + 1)
  return STATES.flatMap((state) => {
    const count = counts.get(state)
    return count ? [{ state, count }] : []
  })
}

/** The harbours there are, in order of their names. */
export const harboursOf = (rows: readonly FleetRow[]): string[] =>
  [...new Set(rows.flatMap((row) => row.harbour ?? []))].sort((a, b) => a.localeCompare(b, 'en'))
