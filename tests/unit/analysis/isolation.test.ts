import { describe, expect, test } from 'vitest'
import {
  isolate,
  type IsolationPart,
  type IsolationTest,
  partPriors,
  waitSeconds,
} from '@/lib/analysis/isolation'
import { inHgToPa } from '@/shared/units'

const PARTS: readonly IsolationPart[] = Object.freeze([
  { key: 'tank', kind: 'tank', volumeM3: 0.03 },
  { key: 'switch', kind: 'switch', volumeM3: 0.00002 },
  { key: 'pump', kind: 'pump', volumeM3: 0.0005 },
  { key: 'hose-a', kind: 'hose', volumeM3: 0.005 },
  { key: 'head-a', kind: 'head', volumeM3: 0.0004 },
  { key: 'hose-b', kind: 'hose', volumeM3: 0.004 },
  { key: 'head-b', kind: 'head', volumeM3: 0.0004 },
])
const ALL = PARTS.map((part) => part.key)
const allBut = (...left: string[]) => ALL.filter((key) => !left.includes(key))
const volumeOf = (keys: readonly string[]) =>
  PARTS.reduce((sum, part) => (keys.includes(part.key) ? sum + part.volumeM3 : sum), 0)
const FLOW = (volumeOf(ALL) * inHgToPa(1.2)) / 3600

/** A test in which so much of the boat's flow comes in. */
function made(keys: readonly string[], share: number, seconds = 1800): IsolationTest {
  const fallPa = (share * FLOW * seconds) / volumeOf(keys)
  const startPa = inHgToPa(10)
  return Object.freeze({
    parts: keys,
    startPa,
    endPa: Math.max(0, startPa - fallPa),
    seconds,
    resolutionPa: inHgToPa(0.01),
  })
}
const probability = (result: ReturnType<typeof isolate>, key: string) =>
  result.suspects.find((suspect) => suspect.key === key)?.probability ?? NaN
const share = (result: ReturnType<typeof isolate>, key: string) =>
  result.shares.find((item) => item.key === key)

describe('chances and shares', () => {
  test('before any test the chances are the prior and nothing is shared out; the whole boat comes first', () => {
    const result = isolate({ parts: PARTS, tests: [] })
    expect(result.shares).toEqual([])
    expect(probability(result, 'pump')).toBeCloseTo(0.22, 9)
    expect(probability(result, 'head-a')).toBeCloseTo(0.2, 9)
    expect(result.next?.parts).toEqual(ALL)
  })

  test('the whole boat alone tells how much, not where', () => {
    const result = isolate({ parts: PARTS, tests: [made(ALL, 1)] })
    expect(result.shares.reduce((sum, item) => sum + item.flowPaM3PerS, 0) / FLOW).toBeCloseTo(1, 2)
    expect(share(result, 'tank')).toMatchObject({ low: 0 })
    expect((share(result, 'tank')?.high ?? 0) / FLOW).toBeGreaterThan(0.95)
    expect(probability(result, 'pump')).toBeCloseTo(0.22, 6)
    expect(result.next).not.toBeNull()
  })

  test('a head off and the leak gone: that head, and all else cleared with a bound', () => {
    const result = isolate({ parts: PARTS, tests: [made(ALL, 1), made(allBut('head-a'), 0)] })
    expect(probability(result, 'head-a')).toBeGreaterThan(0.98)
    expect(share(result, 'head-a')?.share).toBeGreaterThan(0.95)
    expect((share(result, 'tank')?.high ?? 1) / FLOW).toBeLessThan(0.03)
    expect(result.next).toBeNull()
  })

  test('shares add up to the flow, chances to one: two leaks of seven and three', () => {
    const tests = [
      made(ALL, 1),
      made(allBut('head-a'), 0.3),
      made(allBut('head-b'), 1),
      made(['tank', 'switch', 'pump'], 0.3),
      made(['pump'], 0.3, 60),
      made(['hose-a', 'head-a'], 0.7, 60),
    ]
    const result = isolate({ parts: PARTS, tests })
    expect(share(result, 'head-a')?.share).toBeCloseTo(0.7, 1)
    expect(share(result, 'pump')?.share).toBeCloseTo(0.3, 1)
    expect(result.shares.reduce((sum, item) => sum + item.share, 0)).toBeCloseTo(1, 9)
    expect(result.suspects.reduce((sum, item) => sum + item.probability, 0)).toBeCloseTo(1, 9)
    expect(result.contradictions).toEqual([])
    for (const item of result.shares) {
      expect(item.low).toBeLessThanOrEqual(item.flowPaM3PerS + 1e-12)
      expect(item.high).toBeGreaterThanOrEqual(item.flowPaM3PerS - 1e-12)
    }
  })

  test('half a minute on a tenth of the volume is the same leak', () => {
    const small = isolate({ parts: PARTS, tests: [made(ALL, 1), made(['hose-a', 'head-a'], 1, 40)] })
    expect(probability(small, 'hose-a') + probability(small, 'head-a')).toBeGreaterThan(0.98)
  })

  test('a test that fell to nought is a bound: the leak is in it, and may be more than it shows', () => {
    const emptied = made(['pump'], 1, 3600)
    expect(emptied.endPa).toBe(0)
    const result = isolate({ parts: PARTS, tests: [made(ALL, 1), emptied] })
    expect(result.contradictions).toEqual([])
    expect(probability(result, 'pump')).toBeGreaterThan(0.9)
    expect(share(result, 'pump')?.high ?? 0).toBeGreaterThan(0.95 * FLOW)
    const alone = isolate({ parts: PARTS, tests: [emptied] })
    expect(share(alone, 'pump')).toMatchObject({ high: null })
    expect(share(alone, 'pump')?.low ?? 0).toBeGreaterThan(0.9 * ((0.0005 * inHgToPa(10)) / 3600))
  })

  test('the barometer that fell during a test did not leak', () => {
    const weather = { barometerStartPa: 101_325, barometerEndPa: 101_325 - inHgToPa(0.6) }
    const tests = [made(ALL, 1), { ...made(allBut('head-b'), 1), ...weather }]
    expect(probability(isolate({ parts: PARTS, tests }), 'head-b')).toBeGreaterThan(0.95)
  })

  test('the record sways the prior', () => {
    expect(partPriors(PARTS, { 'head-b': 3 }).get('head-b')).toBeCloseTo(0.6 / 1.4, 9)
    expect(probability(isolate({ parts: PARTS, tests: [], priorFactors: { pump: 0 } }), 'pump')).toBe(0)
  })
})

describe('what cannot be told', () => {
  test('tank and switch are in every test together', () => {
    expect(isolate({ parts: PARTS, tests: [made(ALL, 1)] }).inseparable).toEqual([['tank', 'switch']])
  })

  test('with fewer tests to choose from more is inseparable, and nothing is left to do', () => {
    const result = isolate({
      parts: PARTS,
      tests: [made(ALL, 1), made(['tank', 'switch', 'pump'], 0)],
      possible: [],
    })
    expect(result.inseparable).toContainEqual(['hose-a', 'head-a', 'hose-b', 'head-b'])
    expect(result.next).toBeNull()
  })

  test('a part that leaks more than the whole contradicts it; the less precise is to be repeated', () => {
    const rough = { ...made(['tank', 'switch', 'pump'], 2.2), resolutionPa: inHgToPa(0.1) }
    const result = isolate({ parts: PARTS, tests: [made(ALL, 1), rough] })
    expect(result.contradictions).toEqual([{ tests: [0, 1], repeat: 1 }])
  })

  test('of three, the odd one out is to be repeated', () => {
    const tests = [
      made(ALL, 1),
      made(allBut('head-a'), 1),
      made(['tank', 'switch', 'pump'], 1),
      made(['pump'], 0, 60),
      made(['tank', 'switch'], 0),
    ]
    const result = isolate({ parts: PARTS, tests })
    expect(result.contradictions.length).toBeGreaterThan(0)
    expect(result.contradictions[0]?.tests).toEqual([2, 3, 4])
  })
})

describe('the next test', () => {
  test('is one of the possible, with its minutes and a reason that names what each outcome means', () => {
    const possible = [
      { parts: ['tank', 'switch', 'pump'], minutes: 12 },
      { parts: allBut('head-a'), minutes: 25 },
    ]
    const { next } = isolate({
      parts: PARTS.map((part) => ({ ...part, name: `the ${part.key}` })),
      tests: [made(ALL, 1)],
      possible,
    })
    expect(next?.parts).toEqual(possible[0]?.parts)
    expect(next?.minutes).toBeGreaterThanOrEqual(12)
    expect(next?.why).toMatch(/If it leaks: the pump.*If it holds: .*the head-a/)
  })

  test('the quicker of two that say the same', () => {
    const possible = [
      { parts: allBut('pump'), minutes: 40 },
      { parts: ['pump'], minutes: 5 },
    ]
    expect(isolate({ parts: PARTS, tests: [made(ALL, 1)], possible }).next?.parts).toEqual(['pump'])
  })

  test('nothing seen to leak: the whole boat again, longer', () => {
    const { next } = isolate({ parts: PARTS, tests: [made(ALL, 0)] })
    expect(next?.parts).toEqual(ALL)
    expect(next?.waitMinutes).toBeGreaterThanOrEqual(120)
    expect(isolate({ parts: PARTS, tests: [made(ALL, 0, 8 * 3600)] }).next).toBeNull()
  })

  test('a second leak is looked for when one does not explain the flow', () => {
    const tests = [made(ALL, 1), made(['pump'], 0.55, 60), made(['tank', 'switch', 'pump'], 0.55)]
    const { next } = isolate({ parts: PARTS, tests })
    expect(next).not.toBeNull()
  })

  test('minutes needed: V·resolution over a quarter of the flow, seconds for small parts', () => {
    expect(waitSeconds(0.04, inHgToPa(0.1), FLOW)).toBeCloseTo((0.04 * inHgToPa(0.1)) / (FLOW / 4), 6)
    expect(waitSeconds(0.0005, inHgToPa(0.01), FLOW)).toBeLessThanOrEqual(120)
    expect(waitSeconds(0.04, inHgToPa(0.1), 0)).toBe(5400)
  })
})

describe('refuses', () => {
  test.each([
    ['parts unknown', { ...made(ALL, 1), parts: ['keel'] }],
    ['no gas in the test', { ...made(ALL, 1), parts: [] }],
    ['no time', { ...made(ALL, 1), seconds: 0 }],
    ['no vacuum', { ...made(ALL, 1), startPa: 0 }],
  ])('%s', (_, test_) => {
    expect(() => isolate({ parts: PARTS, tests: [test_] })).toThrow(RangeError)
  })

  test('two parts of one key', () => {
    expect(() =>
      isolate({ parts: [...PARTS, { key: 'tank', kind: 'tank', volumeM3: 1 }], tests: [] }),
    ).toThrow(RangeError)
  })
})
