/**
 * Seeded randomness in two forms: a generator whose state can be saved (sfc32), and values that are a pure
 * function of (seed, stream, index). The second needs no state at all, so weather and habits are the same
 * whichever moment one starts from.
 */

/** sfc32's four words, as plain numbers so that they survive JSON. */
export type RandomState = [number, number, number, number]

/** FNV-1a of a text, to turn a name into a seed. */
export function seedFromText(text: string): number {
  let hash = 0x811c9dc5
  for (let i = 0; i < text.length; i++) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193)
  return hash >>> 0
}

/** A well-mixed 32-bit value of whole numbers (murmur3's finaliser after each). */
export function hash32(...parts: readonly number[]): number {
  let hash = 0x9e3779b9
  for (const part of parts) {
    hash = Math.imul(hash ^ (part | 0), 0x85ebca6b)
    hash ^= hash >>> 13
    hash = Math.imul(hash, 0xc2b2ae35)
    hash ^= hash >>> 16
    hash = Math.imul(hash + Math.floor(part / 0x1_0000_0000), 0x27d4eb2f) ^ (hash >>> 15)
  }
  hash ^= hash >>> 16
  hash = Math.imul(hash, 0x7feb352d)
  hash ^= hash >>> 15
  hash = Math.imul(hash, 0x846ca68b)
  return (hash ^ (hash >>> 16)) >>> 0
}

const unit = (word: number): number => (word + 0.5) / 0x1_0000_0000

/** Uniform in (0, 1) as a function of its arguments alone. */
export const hashUniform = (...parts: readonly number[]): number => unit(hash32(...parts))

/** Box–Muller's cosine half. */
const normalOf = (u: number, v: number): number => Math.sqrt(-2 * Math.log(u)) * Math.cos(2 * Math.PI * v)

/** Standard normal as a function of its arguments alone. */
export const hashNormal = (seed: number, stream: number, index: number): number =>
  normalOf(hashUniform(seed, stream, index, 1), hashUniform(seed, stream, index, 2))

/** A generator's starting state for one purpose. */
export function randomState(seed: number, stream: number): RandomState {
  const state: RandomState = [hash32(seed, stream, 1), hash32(seed, stream, 2), hash32(seed, stream, 3), 1]
  for (let i = 0; i < 12; i++) nextUniform(state)
  return state
}

/** sfc32: the next uniform in (0, 1). Changes `state`. */
export function nextUniform(state: RandomState): number {
  const [a, b, c, d] = state
  const sum = (((a + b) | 0) + d) | 0
  state[3] = (d + 1) | 0
  state[0] = b ^ (b >>> 9)
  state[1] = (c + (c << 3)) | 0
  state[2] = (((c << 21) | (c >>> 11)) + sum) | 0
  return unit(sum >>> 0)
}

/** The next standard normal. Changes `state`. */
export function nextNormal(state: RandomState): number {
  const u = nextUniform(state)
  return normalOf(u, nextUniform(state))
}

/** Poisson count of a mean under about 50 from one uniform (inversion). */
export function poissonOf(mean: number, uniform: number): number {
  let term = Math.exp(-mean)
  let cumulative = term
  let count = 0
  while (uniform > cumulative && count < 500) {
    count += 1
    term *= mean / count
    cumulative += term
  }
  return count
}

/**
 * Smooth noise of unit variance at its knots: normals at multiples of `knotMs`, joined by a Catmull–Rom
 * spline. The returned function remembers its last interval for speed; the value depends on time alone.
 */
export function smoothNoise(seed: number, stream: number, knotMs: number): (atMs: number) => number {
  let interval = Number.NaN
  let p0 = 0
  let p1 = 0
  let p2 = 0
  let p3 = 0
  return (atMs) => {
    const knot = Math.floor(atMs / knotMs)
    if (knot !== interval) {
      interval = knot
      p0 = hashNormal(seed, stream, knot - 1)
      p1 = hashNormal(seed, stream, knot)
      p2 = hashNormal(seed, stream, knot + 1)
      p3 = hashNormal(seed, stream, knot + 2)
    }
    const x = atMs / knotMs - knot
    return p1 + 0.5 * x * (p2 - p0 + x * (2 * p0 - 5 * p1 + 4 * p2 - p3 + x * (3 * (p1 - p2) + p3 - p0)))
  }
}
