import type { Part, PartKind } from '@/shared/schemas'

export type PlacedPart = { part: Part; column: number; row: number }

/** As the air goes: heads, hoses, tank with its switch, pump. */
const COLUMN: Record<PartKind, number> = { head: 0, hose: 1, tank: 2, switch: 2, pump: 3 }

/**
 * Places the parts in columns by kind, each branch on one row: a hose stands beside the head that it carries.
 * Parts of a column keep the order they were given in; empty columns are closed up.
 */
export function layOut(parts: readonly Part[]): PlacedPart[] {
  const rows = new Map<string, number>()
  const taken = new Map<number, Set<number>>()
  const take = (column: number, wanted: number): number => {
    const used = taken.get(column) ?? new Set<number>()
    let row = wanted
    while (used.has(row)) row += 1
    used.add(row)
    taken.set(column, used)
    return row
  }
  const inOrder = (['head', 'hose', 'tank', 'switch', 'pump'] as const).flatMap((kind) =>
    parts.filter((part) => part.kind === kind),
  )
  const placed = inOrder.map((part) => {
    const column = COLUMN[part.kind]
    const feeding = inOrder.find((other) => other.parent === part.key && rows.has(other.key))
    const row = take(column, feeding ? (rows.get(feeding.key) ?? 0) : 0)
    rows.set(part.key, row)
    return { part, column, row }
  })
  const used = [...new Set(placed.map((place) => place.column))].sort((a, b) => a - b)
  return placed.map((place) => ({ ...place, column: used.indexOf(place.column) }))
}
