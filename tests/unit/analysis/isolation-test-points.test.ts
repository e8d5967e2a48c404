import { describe, expect, test } from 'vitest'
import { type IsolationPart, listTestPoints, possibleTests, TEST_POINTS } from '@/lib/analysis/isolation'

const part = (key: string, kind: IsolationPart['kind'], parent?: string): IsolationPart => ({
  key,
  kind,
  volumeM3: 0.001,
  parent,
})

/** A tank with a manifold hose to two branches of one head each, a head of its own, and a suction hose. */
const YACHT = [
  part('tank', 'tank'),
  part('switch', 'switch', 'tank'),
  part('suction', 'hose', 'tank'),
  part('pump', 'pump', 'suction'),
  part('hose-fore', 'hose', 'tank'),
  part('head-fore', 'head', 'hose-fore'),
  part('hose-aft', 'hose', 'tank'),
  part('head-port', 'head', 'hose-aft'),
  part('head-starboard', 'head', 'hose-aft'),
]
const sets = (
  parts: readonly IsolationPart[],
  kind: string,
  systemKind?: Parameters<typeof listTestPoints>[1],
) =>
  listTestPoints(parts, systemKind)
    .filter((point) => point.kind === kind)
    .map((point) => point.parts)

describe('what is in a test follows from the drawing', () => {
  test('nothing plugged: everything', () => {
    expect(sets(YACHT, 'whole-boat')).toEqual([YACHT.map((item) => item.key)])
  })

  test("plugs at the tank's head ports: tank, switch, suction hose, pump", () => {
    expect(sets(YACHT, 'tank-ports')).toEqual([['tank', 'switch', 'suction', 'pump']])
  })

  test('branch capped: that branch with its heads', () => {
    expect(sets(YACHT, 'branch-capped')).toEqual([
      ['hose-fore', 'head-fore'],
      ['hose-aft', 'head-port', 'head-starboard'],
    ])
  })

  test('pump left out and pump alone', () => {
    expect(sets(YACHT, 'pump-inlet')).toEqual([['pump']])
    expect(sets(YACHT, 'pump-left-out')[0]).not.toContain('pump')
    expect(sets(YACHT, 'pump-left-out')[0]).toContain('suction')
  })

  test('a head off: all but that head', () => {
    const off = sets(YACHT, 'head-off')
    expect(off).toHaveLength(3)
    expect(off[0]).not.toContain('head-fore')
    expect(off[0]).toHaveLength(YACHT.length - 1)
  })
})

describe('kinds of system', () => {
  test('a unit of pump and tank has no test point at the pump, one on demand none at all', () => {
    expect(sets(YACHT, 'pump-inlet', 'unit')).toEqual([])
    expect(sets(YACHT, 'pump-left-out', 'unit')).toEqual([])
    expect(listTestPoints(YACHT, 'on-demand')).toEqual([])
    expect(listTestPoints([])).toEqual([])
  })

  test('one branch needs no capping', () => {
    expect(
      sets(
        [part('tank', 'tank'), part('hose', 'hose', 'tank'), part('head', 'head', 'hose')],
        'branch-capped',
      ),
    ).toEqual([])
  })
})

describe('parts that nobody drew', () => {
  const bare = (kinds: IsolationPart['kind'][]) => kinds.map((kind, index) => part(`${kind}-${index}`, kind))

  test('as many hoses as heads: one each', () => {
    expect(sets(bare(['tank', 'pump', 'hose', 'hose', 'head', 'head']), 'branch-capped')).toEqual([
      ['hose-2', 'head-4'],
      ['hose-3', 'head-5'],
    ])
  })

  test('else all hoses carry all heads, and the tank side is the rest', () => {
    const parts = bare(['tank', 'switch', 'pump', 'hose', 'head', 'head'])
    expect(sets(parts, 'tank-ports')).toEqual([['tank-0', 'switch-1', 'pump-2']])
    expect(sets(parts, 'branch-capped')).toEqual([])
  })
})

test('a wetted bowl is a sign, not an equation', () => {
  expect(TEST_POINTS['bowl-wetted'].isSign).toBe(true)
  const equations = possibleTests(listTestPoints(YACHT))
  expect(equations).toHaveLength(listTestPoints(YACHT).length - 3)
})
