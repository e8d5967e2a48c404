import {
  holdVariable,
  minimiseNonNegative,
  type QuadraticForm,
  type QuadraticMinimum,
} from '@/lib/analysis/statistics'

/** Rise of χ² at the ends of a 95 % interval of one figure. */
const CHI_SQUARED_95 = 3.841458820694124
/** Beyond so many times the largest flow read, a flow counts as unbounded. */
const UNBOUNDED = 1e3
/** Ends are found to this share of the largest flow read. */
const PRECISE = 1e-4
const MOST_STEPS = 40

/**
 * 95 % interval of one flow: as far either way as the other flows can still make up for it (rise of χ²).
 * The upper end is null where nothing bounds it.
 */
export function flowInterval(
  form: QuadraticForm,
  best: QuadraticMinimum,
  index: number,
  flow: number,
  scale: number,
): [number, number | null] {
  let passive = best.passive
  // The square root of a rise that grows with the square is nearly straight: few steps find its zero.
  const beyond = (value: number) => {
    const held = minimiseNonNegative(holdVariable(form, index, value), passive)
    passive = held.passive
    const constantRise = held.value - best.value
    return Math.sqrt(Math.max(0, constantRise)) - Math.sqrt(CHI_SQUARED_95)
  }
  const low = beyond(0) <= 0 ? 0 : zeroBetween(beyond, flow, 0, PRECISE * scale)
  let outside = flow + scale
  while (beyond(outside) <= 0) {
    outside = flow + 4 * (outside - flow)
    if (outside > UNBOUNDED * scale) return [low, null]
  }
  return [Math.min(low, flow), Math.max(flow, zeroBetween(beyond, flow, outside, PRECISE * scale))]
}

/** Where a function turns positive on the way from one value to another (the Illinois rule). */
function zeroBetween(f: (value: number) => number, from: number, to: number, precise: number): number {
  let [inside, outside] = [from, to]
  let [under, over] = [Math.min(f(inside), -1e-9), f(outside)]
  for (let step = 0; step < MOST_STEPS && Math.abs(outside - inside) > precise; step += 1) {
    const guess = inside + ((outside - inside) * under) / (under - over)
    const value = f(guess)
    if (Math.abs(value) < 1e-3) return guess
    if (value > 0) {
      outside = guess
      over = value
      under /= 2
    } else {
      inside = guess
      under = value
      over /= 2
    }
  }
  return (inside + outside) / 2
}
