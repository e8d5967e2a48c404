import { expect, test } from 'vitest'
import { nonNegativeLeastSquares, solveColumns } from '@/lib/analysis/statistics'
import { expectNear } from './near'

test('the 4 × 2 example of the lsqnonneg documentation (x = [0, 0.6929]: value from memory); Lawson & Hanson 1974', () => {
  const A = [
    [0.0372, 0.2869],
    [0.6861, 0.7071],
    [0.6233, 0.6245],
    [0.6344, 0.617],
  ]
  const b = [0.8587, 0.1781, 0.0747, 0.8405]
  const fit = nonNegativeLeastSquares(A, b)
  expect(fit.x[0]).toBe(0)
  expectNear(fit.x[1], 0.6929343971302934, 1e-10)
  expectNear(fit.residualNorm, 0.9118420648683148, 1e-10)
  const free = solveColumns(A, b, [0, 1])
  expectNear(free[0], -2.5627465417829733, 1e-10)
  expectNear(free[1], 3.1107766131645422, 1e-10)
})

test('scipy.optimize.nnls docstring example', () => {
  const A = [
    [1, 0],
    [1, 0],
    [0, 1],
  ]
  const first = nonNegativeLeastSquares(A, [2, 1, 1])
  expectNear(first.x[0], 1.5, 1e-12)
  expectNear(first.x[1], 1, 1e-12)
  expectNear(first.residualNorm, 0.7071067811865475, 1e-12)
  const second = nonNegativeLeastSquares(A, [-1, -1, -1])
  expect(second.x).toEqual([0, 0])
  expectNear(second.residualNorm, 1.7320508075688772, 1e-12)
})
