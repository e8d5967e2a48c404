import type { Matrix } from './least-squares'

/** |A·x − b|² = xᵀ·gram·x − 2·linear·x + constant. */
export type QuadraticForm = { gram: number[][]; linear: number[]; constant: number }
export type QuadraticMinimum = { x: number[]; value: number; passive: number[] }

/** A pivot under this share of its column's own size: the column depends on those before it. */
const DEPENDENT = 1e-11

/** The squares of a least-squares problem, added up once for many solutions. */
export function quadraticForm(matrix: Matrix, target: readonly number[]): QuadraticForm {
  const width = matrix[0]?.length ?? 0
  const gram = Array.from({ length: width }, () => new Array<number>(width).fill(0))
  const linear = new Array<number>(width).fill(0)
  let constant = 0
  matrix.forEach((row, index) => {
    const goal = target[index] ?? 0
    constant += goal * goal
    row.forEach((a, i) => {
      if (a === 0) return
      linear[i] = (linear[i] ?? 0) + a * goal
      const gramRow = gram[i]
      if (gramRow !== undefined) row.forEach((b, j) => (gramRow[j] = (gramRow[j] ?? 0) + a * b))
    })
  })
  return { gram, linear, constant }
}

/** The form with one variable held at a value; its own row and column become nought, so that it stays at 0. */
export function holdVariable(form: QuadraticForm, index: number, value: number): QuadraticForm {
  const own = form.gram[index] ?? []
  return {
    gram: form.gram.map((row, i) => row.map((entry, j) => (i === index || j === index ? 0 : entry))),
    linear: form.linear.map((entry, i) => (i === index ? 0 : entry - (own[i] ?? 0) * value)),
    constant: form.constant - 2 * (form.linear[index] ?? 0) * value + (own[index] ?? 0) * value * value,
  }
}

/**
 * Smallest value of a form over x ≥ 0 (Lawson & Hanson's active sets on the normal equations): for many
 * similar problems, each started from the last one's `passive` set. Less exact than
 * `nonNegativeLeastSquares` where columns nearly depend on one another.
 */
export function minimiseNonNegative(form: QuadraticForm, start: readonly number[] = []): QuadraticMinimum {
  const { gram, linear } = form
  const size = (index: number) => Math.sqrt(gram[index]?.[index] ?? 0)
  const passive = new Set(start.filter((index) => size(index) > 0))
  let x = settle(
    form,
    linear.map(() => 0),
    passive,
  )
  const scale = Math.sqrt(form.constant) + 1e-300
  for (let round = 0; round < 3 * linear.length + 10; round += 1) {
    let enter = -1
    let most = 1e-10 * scale
    linear.forEach((entry, index) => {
      if (passive.has(index) || size(index) === 0) return
      const gain = (entry - dot(gram[index] ?? [], x)) / size(index)
      if (gain > most) [enter, most] = [index, gain]
    })
    if (enter < 0) break
    passive.add(enter)
    x = settle(form, x, passive)
  }
  const value =
    form.constant - 2 * dot(linear, x) + x.reduce((sum, xi, i) => sum + xi * dot(gram[i] ?? [], x), 0)
  return { x, value: Math.max(0, value), passive: [...passive] }
}

const dot = (a: readonly number[], b: readonly number[]): number => {
  let sum = 0
  for (let index = 0; index < a.length; index += 1) sum += (a[index] ?? 0) * (b[index] ?? 0)
  return sum
}

/** Solves on the passive set; variables that turn negative leave it, as far along as all stay positive. */
function settle(form: QuadraticForm, from: readonly number[], passive: Set<number>): number[] {
  let x = from.slice()
  while (passive.size > 0) {
    const columns = [...passive]
    const solved = solveSymmetric(form, columns)
    const trial = x.map(() => 0)
    columns.forEach((index, k) => (trial[index] = solved[k] ?? 0))
    const blocked = columns.filter((index) => (trial[index] ?? 0) <= 0)
    if (blocked.length === 0) return trial
    const along = (index: number) => (x[index] ?? 0) / ((x[index] ?? 0) - (trial[index] ?? 0) || 1)
    const step = Math.min(...blocked.map(along))
    const leaving = blocked.filter((index) => along(index) <= step)
    x = x.map((value, index) => value + step * ((trial[index] ?? 0) - value))
    for (const index of leaving) {
      passive.delete(index)
      x[index] = 0
    }
  }
  return x.map(() => 0)
}

/** Cholesky over some of the variables; one that depends on those before it gets 0. */
function solveSymmetric({ gram, linear }: QuadraticForm, columns: readonly number[]): number[] {
  const lower: number[][] = []
  const forward: number[] = []
  columns.forEach((column, i) => {
    const row: number[] = []
    for (let j = 0; j < i; j += 1) {
      const pivot = lower[j]?.[j] ?? 0
      const inner = dot(row, lower[j]?.slice(0, j) ?? [])
      row.push(pivot === 0 ? 0 : ((gram[column]?.[columns[j] ?? -1] ?? 0) - inner) / pivot)
    }
    const own = gram[column]?.[column] ?? 0
    const left = own - dot(row, row)
    const pivot = left > DEPENDENT * own ? Math.sqrt(left) : 0
    forward.push(pivot === 0 ? 0 : ((linear[column] ?? 0) - dot(row, forward)) / pivot)
    lower.push([...row, pivot])
  })
  const solution = new Array<number>(columns.length).fill(0)
  for (let i = columns.length - 1; i >= 0; i -= 1) {
    const pivot = lower[i]?.[i] ?? 0
    if (pivot === 0) continue
    let value = forward[i] ?? 0
    for (let k = i + 1; k < columns.length; k += 1) value -= (lower[k]?.[i] ?? 0) * (solution[k] ?? 0)
    solution[i] = value / pivot
  }
  return solution
}
