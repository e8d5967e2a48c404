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
    const feeding = inOrder.flatMap((other) => {
      const row = other.parent === part.key ? rows.get(other.key) : undefined
      return row === undefined ? [] : [row]
    })
    const row = take(column, feeding.length > 0 ? Math.min(...feeding) : 0)
    rows.set(part.key, row)
    return { part, column, row }
  })
  const used = [...new Set(placed.map((place) => place.column))].sort((a, b) => a - b)
  return placed.map((place) => ({ ...place, column: used.indexOf(place.column) }))
}

export type UprightPart = { part: Part; depth: number; row: number }
const DEEPEST = 4

/**
 * Places the parts one beneath the other, each under the part it leads to and set in by one. Parts that lead in a
 * ring, or to none that is drawn, stand at the margin; no part is left out.
 */
export function layOutUpright(parts: readonly Part[]): UprightPart[] {
  const keys = new Set(parts.map((part) => part.key))
  const placed: UprightPart[] = []
  const done = new Set<string>()
  const place = (part: Part, depth: number): void => {
    if (done.has(part.key)) return
    done.add(part.key)
    placed.push({ part, depth: Math.min(depth, DEEPEST), row: placed.length })
    for (const other of parts) if (other.parent === part.key) place(other, depth + 1)
  }
  for (const part of parts) if (part.parent === null || !keys.has(part.parent)) place(part, 0)
  for (const part of parts) place(part, 0)
  return placed
}
