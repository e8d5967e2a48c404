/** A small symmetric matrix with its rows one after another. */
export type Symmetric = Float64Array

/**
 * Inverse of a small symmetric positive definite matrix by Cholesky's factors.
 * @returns rows one after another, or null where the matrix is not positive definite (NaN included)
 */
export function invertSymmetric(matrix: Symmetric, size: number): Symmetric | null {
  const lower = new Float64Array(size * size)
  for (let row = 0; row < size; row += 1) {
    for (let column = 0; column <= row; column += 1) {
      let sum = at(matrix, row * size + column)
      for (let k = 0; k < column; k += 1) sum -= at(lower, row * size + k) * at(lower, column * size + k)
      if (row === column) {
        if (!(sum > 0)) return null
        lower[row * size + row] = Math.sqrt(sum)
      } else {
        lower[row * size + column] = sum / at(lower, column * size + column)
      }
    }
  }
  const inverse = new Float64Array(size * size)
  for (let unit = 0; unit < size; unit += 1) {
    const solved = new Float64Array(size)
    for (let row = 0; row < size; row += 1) {
      let sum = row === unit ? 1 : 0
      for (let k = 0; k < row; k += 1) sum -= at(lower, row * size + k) * at(solved, k)
      solved[row] = sum / at(lower, row * size + row)
    }
    for (let row = size - 1; row >= 0; row -= 1) {
      let sum = at(solved, row)
      for (let k = row + 1; k < size; k += 1) sum -= at(lower, k * size + row) * at(solved, k)
      solved[row] = sum / at(lower, row * size + row)
    }
    for (let row = 0; row < size; row += 1) inverse[row * size + unit] = at(solved, row)
  }
  return inverse
}

/** Matrix times vector. */
export function timesVector(matrix: Symmetric, vector: Float64Array, size: number): Float64Array {
  const product = new Float64Array(size)
  for (let row = 0; row < size; row += 1) {
    let sum = 0
    for (let k = 0; k < size; k += 1) sum += at(matrix, row * size + k) * at(vector, k)
    product[row] = sum
  }
  return product
}

/** An element that is within the array by construction. */
export const at = (values: Float64Array, index: number): number => values[index] ?? 0
