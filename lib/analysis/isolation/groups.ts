/** Parts that are in exactly the same tests, in the order of the parts. */
export function groupBySets(keys: readonly string[], sets: readonly ReadonlySet<string>[]): string[][] {
  const groups = new Map<string, string[]>()
  for (const key of keys) {
    const pattern = sets.map((set) => (set.has(key) ? '1' : '0')).join('')
    groups.set(pattern, [...(groups.get(pattern) ?? []), key])
  }
  return [...groups.values()]
}
