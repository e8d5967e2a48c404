import { expect, test } from 'vitest'
import {
  isolate,
  type IsolationTest,
  listTestPoints,
  possibleTests,
  volumeOf,
  waitSeconds,
} from '@/lib/analysis/isolation'
import { quantile, seededRandom } from '@/lib/analysis/statistics'
import { inHgToPa } from '@/shared/units'
import { type Boat, drawBoat, makeTest } from './isolation-boats'

const BOATS = 500
const LOGGER_PA = inHgToPa(0.01)

const groupOf = (key: string, inseparable: readonly string[][]) =>
  inseparable.find((group) => group.includes(key)) ?? [key]

/** The logger's own reading of the whole boat, half an hour of the night. */
const wholeBoat = (boat: Boat, random: () => number) =>
  makeTest(
    boat,
    boat.parts.map((part) => part.key),
    1800,
    LOGGER_PA,
    random,
  )

function followAdvice(boat: Boat, random: () => number) {
  const tests: IsolationTest[] = [wholeBoat(boat, random)]
  for (;;) {
    const answer = isolate({ parts: boat.parts, tests })
    if (answer.next === null || tests.length > 12) return { answer, handTests: tests.length - 1, tests }
    tests.push(makeTest(boat, answer.next.parts, answer.next.waitMinutes * 60, boat.gaugePa, random))
  }
}

test(`one leak: the right part over ${BOATS} boats`, () => {
  const random = seededRandom(20_261)
  const counts: number[] = []
  const minutes: number[] = []
  let right = 0
  let contradictory = 0
  for (let index = 0; index < BOATS; index += 1) {
    const boat = drawBoat(random, null)
    const { answer, handTests, tests } = followAdvice(boat, random)
    const named = groupOf(answer.suspects[0]?.key ?? '', answer.inseparable)
    if (boat.leaking.every((key) => named.includes(key))) right += 1
    if (answer.contradictions.length > 0) contradictory += 1
    counts.push(handTests)
    minutes.push(tests.slice(1).reduce((sum, made) => sum + made.seconds / 60, 0))
  }
  const histogram = [...new Set(counts)]
    .sort((a, b) => a - b)
    .map((value) => `${value}: ${counts.filter((count) => count === value).length}`)
  const mean = counts.reduce((sum, count) => sum + count, 0) / counts.length
  console.log(
    `one leak: right ${((100 * right) / BOATS).toFixed(1)} %, hand tests ${mean.toFixed(2)} on average (${histogram.join(', ')}), ` +
      `waiting ${quantile(minutes, 0.5)?.toFixed(0)} min (95th percentile ${quantile(minutes, 0.95)?.toFixed(0)}), contradictory ${contradictory}`,
  )
  expect(right / BOATS).toBeGreaterThanOrEqual(0.98)
  expect(mean).toBeLessThanOrEqual(2.9)
})

test(`a second leak of 20 to 70 %: both named over ${BOATS} boats after all tests`, () => {
  const random = seededRandom(20_262)
  const errors: number[] = []
  let named = 0
  let contradictory = 0
  for (let index = 0; index < BOATS; index += 1) {
    const boat = drawBoat(random, { low: 0.2, high: 0.7 })
    const { answer, worst } = allTests(boat, random)
    errors.push(worst)
    if (bothNamed(boat, answer)) named += 1
    if (answer.contradictions.length > 0) contradictory += 1
  }
  const p95 = quantile(errors, 0.95) ?? NaN
  console.log(
    `two leaks: both named ${((100 * named) / BOATS).toFixed(1)} %, share error median ${quantile(errors, 0.5)?.toFixed(3)}, ` +
      `95th percentile ${p95.toFixed(3)}, worst ${Math.max(...errors).toFixed(3)}, contradictory ${contradictory}`,
  )
  expect(named / BOATS).toBeGreaterThanOrEqual(0.97)
  expect(p95).toBeLessThanOrEqual(0.07)
})

/** Thirty minutes are a test (common practice) where the tank is in it; small parts move in seconds. */
function secondsOf(boat: Boat, parts: readonly string[]): number {
  const flow = [...boat.flows.values()].reduce((sum, part) => sum + part, 0)
  const needed = waitSeconds(volumeOf(boat.parts, parts), boat.gaugePa, flow)
  return parts.includes('tank') ? Math.max(1800, needed) : needed
}

function allTests(boat: Boat, random: () => number) {
  const possible = possibleTests(listTestPoints(boat.parts))
  const tests: IsolationTest[] = [wholeBoat(boat, random)]
  for (const { parts } of possible.slice(1)) {
    tests.push(makeTest(boat, parts, secondsOf(boat, parts), boat.gaugePa, random))
  }
  const answer = isolate({ parts: boat.parts, tests })
  const total = [...boat.flows.values()].reduce((sum, flow) => sum + flow, 0)
  const groups = boat.parts.map((part) => groupOf(part.key, answer.inseparable))
  const worst = groups.map((group) => {
    const said = answer.shares
      .filter((share) => group.includes(share.key))
      .reduce((sum, share) => sum + share.share, 0)
    const real = group.reduce((sum, key) => sum + (boat.flows.get(key) ?? 0), 0) / total
    return Math.abs(said - real)
  })
  return { answer, worst: Math.max(...worst) }
}

function bothNamed(boat: Boat, answer: ReturnType<typeof isolate>): boolean {
  const sums = boat.parts.map((part) => {
    const group = groupOf(part.key, answer.inseparable)
    return {
      group,
      share: answer.shares
        .filter((share) => group.includes(share.key))
        .reduce((sum, share) => sum + share.share, 0),
    }
  })
  const ranked = sums.sort((a, b) => b.share - a.share)
  const top = [...new Set(ranked.map((item) => item.group.join()))].slice(0, 2)
  return boat.leaking.every((key) => top.some((group) => group.split(',').includes(key)))
}
