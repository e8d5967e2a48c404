import { expect, test } from 'vitest'
import { figuresOf } from '@/lib/analysis/figures'
import { suspectsOf, type Family, type RecordSuspects } from '@/lib/analysis/signatures'
import { simulateBoat, type BoatSpec } from '@/simulator/boat'
import { randomBoat } from '@/simulator/random-boat'
import { inputAt, recordOf } from './recorded-boat'

const FROM = Date.UTC(2027, 6, 5, 12)
const DAY_MS = 86_400_000
const DAYS = 8
const BOATS = 10

type Leak = BoatSpec['leaks'][number]

/** One leak of a boat that would hold for one to four hours, of the given make. */
function boatWith(seed: number, make: (leak: Leak, seed: number) => Leak): BoatSpec {
  const spec = randomBoat(seed, {
    intervalSeconds: 30,
    holdSeconds: 3600 * (1 + (seed % 7) / 2),
    flushesPerDay: 12,
  })
  const flow = spec.leaks.reduce((sum, leak) => sum + leak.flowPaM3PerS, 0)
  return { ...spec, leaks: [make({ part: 'hose-1', kind: 'laminar', flowPaM3PerS: flow }, seed)] }
}

function suspectsOfBoat(spec: BoatSpec): RecordSuspects {
  const at = FROM + DAYS * DAY_MS
  const { boat, take } = recordOf(spec, FROM)
  take(simulateBoat(spec, FROM, at).samples)
  return suspectsOf({
    at,
    ...boat.rows,
    figures: figuresOf(inputAt(spec, boat, at)),
    standardPressurePa: 101_325,
    steps: [],
    cupTests: [],
    offsets: [],
  })
}

function scored(name: string, from: number, make: (leak: Leak, seed: number) => Leak) {
  const found = Array.from({ length: BOATS }, (_, index) => suspectsOfBoat(boatWith(from + index, make)))
  const first = (family: Family) => found.filter((one) => one.families[0]?.family === family).length
  const among = (family: Family) =>
    found.filter((one) => one.families.some((each) => each.family === family)).length
  const nobody = found.filter((one) => one.families.length === 0).length
  const tally = new Map<string, number>()
  for (const one of found) {
    const family = one.families[0]?.family ?? 'nobody'
    tally.set(family, (tally.get(family) ?? 0) + 1)
  }
  console.log(
    `${name}: ${BOATS} boats, first named ${[...tally].map(([family, count]) => `${family} ${count}`).join(', ')}`,
  )
  return { first, among, nobody }
}

test('a valve that seats anew with each flush', () => {
  const { first } = scored('bowl valve', 610_000, (leak) => ({
    ...leak,
    part: 'head-1',
    reseatsAtFlush: 0.4,
  }))
  expect(first('bowl-valve') / BOATS).toBeGreaterThanOrEqual(0.7)
  expect(first('check-valve') / BOATS).toBeLessThanOrEqual(0.15)
})

test('a check valve that seats anew with each run', () => {
  const { first } = scored('check valve', 620_000, (leak) => ({ ...leak, part: 'pump', reseatsAtRun: 0.4 }))
  expect(first('check-valve') / BOATS).toBeGreaterThanOrEqual(0.7)
  expect(first('bowl-valve') / BOATS).toBeLessThanOrEqual(0.15)
})

test('a seal that dries after a flush', () => {
  const { among } = scored('bowl seal', 630_000, (leak, seed) => ({
    ...leak,
    part: 'head-1',
    flowPaM3PerS: 1.5 * leak.flowPaM3PerS,
    wetting: { wetShare: 1 / 30, wetSeconds: 600 + 150 * (seed % 5), dryingSeconds: 900 },
  }))
  expect(among('bowl-seal') / BOATS).toBeGreaterThanOrEqual(0.7)
})

test('a fixed leak accuses no valve', () => {
  const { first, nobody } = scored('fixed leak', 640_000, (leak) => leak)
  expect((first('bowl-valve') + first('check-valve') + first('bowl-seal')) / BOATS).toBeLessThanOrEqual(0.15)
  expect(nobody / BOATS).toBeGreaterThanOrEqual(0.8)
})
