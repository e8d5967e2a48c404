/** A source of numbers in [0, 1), the same for the same seed on every machine. */
export type Random = () => number

/** Seeded generator (Mulberry32, public domain, 32 bits of state): good enough for resampling, not for secrets. */
export function seededRandom(seed: number): Random {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6d2b79f5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state)
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296
  }
}

/** A standard normal draw (Box–Muller). */
export function normalDraw(random: Random): number {
  const radius = Math.sqrt(-2 * Math.log(1 - random()))
  return radius * Math.cos(2 * Math.PI * random())
}

/** A shuffled copy (Fisher–Yates). */
export function shuffled<T>(items: readonly T[], random: Random): T[] {
  const copy = items.slice()
  for (let last = copy.length - 1; last > 0; last -= 1) {
    const pick = Math.floor(random() * (last + 1))
    ;[copy[last], copy[pick]] = [copy[pick] as T, copy[last] as T] // both indices are within the copy
  }
  return copy
}
