import type { UnitChoice } from '@/shared/units'

export const SHAPES = ['typed', 'cylinder', 'box', 'hose'] as const
export type Shape = (typeof SHAPES)[number]

export const SHAPE_WORDS: Record<Shape, string> = {
  typed: 'typed in',
  cylinder: 'cylinder, by its sizes',
  box: 'box, by its sides',
  hose: 'hose, by its sizes',
}

/** What is measured of each shape, in the order of `volumeM3`'s sizes. */
export const MEASURES: Record<Exclude<Shape, 'typed'>, readonly string[]> = {
  cylinder: ['Diameter inside', 'Length inside'],
  box: ['Length inside', 'Width inside', 'Height inside'],
  hose: ['Inner diameter', 'Length'],
}

const METRIC = {
  tank: { name: 'cm', metres: 0.01 },
  bore: { name: 'mm', metres: 0.001 },
  run: { name: 'm', metres: 1 },
}
const INCHES = { name: 'in', metres: 0.0254 }
const IMPERIAL = { tank: INCHES, bore: INCHES, run: { name: 'ft', metres: 0.3048 } }

/** The unit a size is measured in, for readers of litres and of gallons. */
export function sizeUnit(
  shape: Exclude<Shape, 'typed'>,
  index: number,
  volume: UnitChoice['volume'],
): { name: string; metres: number } {
  const units = volume === 'L' ? METRIC : IMPERIAL
  if (shape !== 'hose') return units.tank
  return index === 0 ? units.bore : units.run
}

/**
 * Volume of a shape from its inner sizes in metres: π/4·d²·L of cylinders and hoses, the product of a box's sides.
 * Null while a size is missing or not above nought. `volumeM3('hose', [0.038, 10]) // 0.01134…`
 */
export function volumeM3(shape: Exclude<Shape, 'typed'>, sizes: readonly (number | null)[]): number | null {
  const [a, b, c] = sizes.map((size) => (size !== null && size > 0 ? size : null))
  if (a == null || b == null) return null
  if (shape === 'box') return c == null ? null : a * b * c
  return (Math.PI / 4) * a * a * b
}
