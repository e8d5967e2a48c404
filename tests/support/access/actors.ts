/**
 * Who asks, in the order of the matrix's columns. The boat is `owner`'s; their shop sees its full record. Every
 * other person stands to that boat as their name says.
 */
export const ACTORS = [
  /** Not signed in. */
  'nobody',
  /** Owns another boat. */
  'strangeOwner',
  /** Manager of a shop that never saw the boat. */
  'strangeManager',
  /** Was technician, installer and manager of the boat's shop; the session lives on. */
  'lapsed',
  /** Technician, installer and manager of a shop whose access to the boat was withdrawn. */
  'withdrawn',
  'owner',
  'technician',
  'installer',
  'manager',
  /** Technician, installer and manager of a shop with the first consent alone. */
  'figures',
] as const
export type Actor = (typeof ACTORS)[number]
export type Person = Exclude<Actor, 'nobody'>

/** `ok` = any 2xx, `in` = sent to the sign-in page, `on` = sent on elsewhere, else the very status. */
export type Expectation = string

/** One row of the matrix, read: what each is answered. @throws Error for a row of another length */
export function cellsOf(name: string, row: string): Record<Actor, Expectation> {
  const cells = row.trim().split(/\s+/)
  if (cells.length !== ACTORS.length)
    throw new Error(`${name} has ${cells.length} cells, and there are ${ACTORS.length} columns`)
  return Object.fromEntries(ACTORS.map((actor, index) => [actor, cells[index]])) as Record<Actor, string>
}

/** Whether an answer is what the matrix says. */
export function fits(expected: Expectation, answer: { status: number; location: string | null }): boolean {
  if (expected === 'ok') return answer.status >= 200 && answer.status < 300
  if (expected === 'in')
    return answer.status >= 300 && answer.status < 400 && (answer.location ?? '').includes('/sign-in')
  if (expected === 'on')
    return answer.status >= 300 && answer.status < 400 && !(answer.location ?? '').includes('/sign-in')
  return answer.status === Number(expected)
}
