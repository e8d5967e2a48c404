/** Rows of equal length. */
export type Matrix = readonly (readonly number[])[]

const dot = (a: readonly number[], b: readonly number[]): number =>
  a.reduce((sum, value, index) => sum + value * (b[index] ?? 0), 0)

const column = (matrix: Matrix, index: number): number[] => matrix.map((row) => row[index] ?? 0)

/**
 * Least squares over some of a matrix's columns, by Gram–Schmidt with a second pass: x minimising
 * |A·x − b|. A column that depends on those before it gets 0.
 * @returns one value for each of `columns`
 */
export function solveColumns(
  matrix: Matrix,
  target: readonly number[],
  columns: readonly number[],
): number[] {
  const basis: number[][] = []
  const upper: number[][] = []
  for (const index of columns) {
    let rest = column(matrix, index)
    const size = Math.sqrt(dot(rest, rest))
    const parts = basis.map(() => 0)
    for (let pass = 0; pass < 2; pass += 1) {
      basis.forEach((unit, k) => {
        const along = dot(unit, rest)
        parts[k] = (parts[k] ?? 0) + along
        rest = rest.map((value, row) => value - along * (unit[row] ?? 0))
      })
    }
    const length = Math.sqrt(dot(rest, rest))
    const independent = length > 1e-11 * size
    basis.push(independent ? rest.map((value) => value / length) : rest.map(() => 0))
    upper.push([...parts, independent ? length : 0])
  }
  const along = basis.map((unit) => dot(unit, target))
  const solution = columns.map(() => 0)
  for (let k = columns.length - 1; k >= 0; k -= 1) {
    const pivot = upper[k]?.[k] ?? 0
    if (pivot === 0) continue
    let value = along[k] ?? 0
    for (let later = k + 1; later < columns.length; later += 1) {
      value -= (upper[later]?.[k] ?? 0) * (solution[later] ?? 0)
    }
    solution[k] = value / pivot
  }
  return solution
}

/** b − A·x. */
export function residuals(matrix: Matrix, target: readonly number[], x: readonly number[]): number[] {
  return target.map((value, row) => value - dot(matrix[row] ?? [], x))
}

export type NonNegativeFit = { x: number[]; residualNorm: number }

/**
 * Non-negative least squares: x ≥ 0 minimising |A·x − b| (Lawson & Hanson 1974, ch. 23). With no rows all
 * 0. Where columns depend on one another one of the solutions comes back. Throws a RangeError where rows
 * and targets differ in number or a figure is not finite.
 * @example nonNegativeLeastSquares([[1, 0], [1, 0], [0, 1]], [2, 1, 1]).x // [1.5, 1]
 */
export function nonNegativeLeastSquares(matrix: Matrix, target: readonly number[]): NonNegativeFit {
  if (matrix.length !== target.length) throw new RangeError('a target for each row')
  if (![...target, ...matrix.flat()].every(Number.isFinite)) throw new RangeError('finite figures only')
  const width = matrix[0]?.length ?? 0
  const columns = Array.from({ length: width }, (_, index) => column(matrix, index))
  const sizes = columns.map((values) => Math.sqrt(dot(values, values)))
  const passive = new Set<number>()
  let x = new Array<number>(width).fill(0)
  for (let round = 0; round < 3 * width + 10; round += 1) {
    const rest = residuals(matrix, target, x)
    const tolerance = 1e-12 * (Math.sqrt(dot(target, target)) + 1e-300)
    const gains = columns.map((values, index) =>
      passive.has(index) || sizes[index] === 0 ? -Infinity : dot(values, rest) / (sizes[index] ?? 1),
    )
    const enter = gains.indexOf(Math.max(...gains))
    if (enter < 0 || (gains[enter] ?? 0) <= tolerance) break
    passive.add(enter)
    x = settle(matrix, target, x, passive)
  }
  const rest = residuals(matrix, target, x)
  return { x, residualNorm: Math.sqrt(dot(rest, rest)) }
}

/** Solves on the passive set, giving up variables that turn negative, as far along as they stay positive. */
function settle(
  matrix: Matrix,
  target: readonly number[],
  from: readonly number[],
  passive: Set<number>,
): number[] {
  let x = from.slice()
  while (passive.size > 0) {
    const columns = [...passive]
    const solved = solveColumns(matrix, target, columns)
    const trial = x.map(() => 0)
    columns.forEach((index, k) => {
      trial[index] = solved[k] ?? 0
    })
    const blocked = columns.filter((index) => (trial[index] ?? 0) <= 0)
    if (blocked.length === 0) return trial
    const steps = blocked.map((index) => (x[index] ?? 0) / ((x[index] ?? 0) - (trial[index] ?? 0) || 1))
    const step = Math.min(...steps)
    x = x.map((value, index) => value + step * ((trial[index] ?? 0) - value))
    blocked.forEach((index, k) => {
      if ((steps[k] ?? 0) > step) return
      passive.delete(index)
      x[index] = 0
    })
  }
  return x
}
