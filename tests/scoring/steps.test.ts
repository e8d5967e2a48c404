import { expect, test } from 'vitest'
import { findSteps } from '@/lib/analysis/steps'
import { quantile, seededRandom } from '@/lib/analysis/statistics'
import { drawSteppedBoat } from './steps-boats'

const BOATS = 300

test.each([2, 0.5])(`steps by a factor of %s on ${BOATS} boats`, (factor) => {
  const random = seededRandom(20_264)
  const errors: number[] = []
  let within = 0
  for (let index = 0; index < BOATS; index += 1) {
    const boat = drawSteppedBoat(random, factor)
    const stepAt = boat.stepAt ?? NaN
    const found = findSteps(boat.legs).map((step) => ({
      holds: Math.abs((step.between[0] + step.between[1]) / 2 - stepAt) / boat.oldHoldMs,
      covers: step.between[0] <= stepAt && stepAt <= step.between[1],
    }))
    const nearest = found.sort((a, b) => a.holds - b.holds)[0]
    if (nearest === undefined || nearest.holds > 2) continue
    errors.push(nearest.holds)
    if (nearest.covers) within += 1
  }
  const dated = errors.filter((holds) => holds <= 0.5).length
  console.log(
    `step × ${factor}: found ${((100 * errors.length) / BOATS).toFixed(1)} %, dated within half an old hold ${((100 * dated) / BOATS).toFixed(1)} % ` +
      `(median ${quantile(errors, 0.5)?.toFixed(2)}, 95th percentile ${quantile(errors, 0.95)?.toFixed(2)} holds), inside its span ${((100 * within) / BOATS).toFixed(1)} %`,
  )
  expect(errors.length / BOATS).toBeGreaterThanOrEqual(0.98)
  // The old hold after a repair is the short one: a night of the new is longer than it.
  expect(dated / BOATS).toBeGreaterThanOrEqual(factor > 1 ? 0.95 : 0.9)
  expect(within / BOATS).toBeGreaterThanOrEqual(0.85)
})

test(`no step on ${BOATS} steady boats`, () => {
  const random = seededRandom(20_265)
  let wrong = 0
  for (let index = 0; index < BOATS; index += 1) {
    if (findSteps(drawSteppedBoat(random, 1).legs).length > 0) wrong += 1
  }
  console.log(`steady boats with a step: ${((100 * wrong) / BOATS).toFixed(1)} %`)
  expect(wrong / BOATS).toBeLessThanOrEqual(0.02)
})
