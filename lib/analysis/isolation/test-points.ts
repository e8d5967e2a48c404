import type { IsolationPart, PossibleTest } from './types'

export type TestPointKind =
  'whole-boat' | 'bowl-wetted' | 'head-off' | 'tank-ports' | 'pump-left-out' | 'pump-inlet' | 'branch-capped'

/** What a kind of test is made of; minutes of taking off and refitting are judged. */
export type TestPointFacts = {
  what: string
  drawnBy: 'pump' | 'hand pump' | 'pump by hand, seconds'
  switchSees: boolean
  minutes: number
  tools: string[]
  /** What is cleared when it holds. */
  cleared: string
  /** Its set of parts is only nearly what is in the test, so it is no equation: a sign, not a reading. */
  isSign: boolean
}

export const TEST_POINTS: Readonly<Record<TestPointKind, TestPointFacts>> = {
  'whole-boat': {
    what: 'nothing plugged, the logger or a gauge teed in',
    drawnBy: 'pump',
    switchSees: true,
    minutes: 2,
    tools: ['vacuum gauge and tee, or the logger'],
    cleared: 'the whole boat, now',
    isSign: false,
  },
  'bowl-wetted': {
    what: 'one bowl wetted, nothing off',
    drawnBy: 'pump',
    switchSees: true,
    minutes: 2,
    tools: ['cup of water'],
    cleared: 'everything else, if the leak fell',
    isSign: true,
  },
  'head-off': {
    what: 'head off, plug in its base',
    drawnBy: 'pump',
    switchSees: true,
    minutes: 25,
    tools: ['base plug', 'new base gasket', 'spanners'],
    cleared: 'all else; that head is the one',
    isSign: false,
  },
  'tank-ports': {
    what: "plugs at the tank's head ports",
    drawnBy: 'pump',
    switchSees: true,
    minutes: 12,
    tools: ['port plugs', 'screwdriver for hose clamps'],
    cleared: 'the tank side',
    isSign: false,
  },
  'pump-left-out': {
    what: 'hose end plugged, pump left out',
    drawnBy: 'hand pump',
    switchSees: true,
    minutes: 12,
    tools: ['hand vacuum pump', 'hose plug', 'screwdriver for hose clamps'],
    cleared: "all but the pump's valves",
    isSign: false,
  },
  'pump-inlet': {
    what: "plug in the pump's inlet",
    drawnBy: 'pump by hand, seconds',
    switchSees: false,
    minutes: 10,
    tools: ['inlet plug with gauge', 'screwdriver for hose clamps'],
    cleared: 'the pump',
    isSign: false,
  },
  'branch-capped': {
    what: 'branch capped at the manifold',
    drawnBy: 'hand pump',
    switchSees: false,
    minutes: 12,
    tools: ['hand vacuum pump', 'manifold cap', 'screwdriver for hose clamps'],
    cleared: 'that branch',
    isSign: false,
  },
}

/** A test point on one boat: which kind, on which part, and the parts that are then in the test. */
export type TestPoint = { kind: TestPointKind; at: string | null; parts: string[] }

export type SystemKind = 'pass-through' | 'collecting' | 'unit' | 'two-pumps' | 'on-demand'

/**
 * The tests that a system drawn as parts allows; the set in each follows from the drawing. Each part's
 * `parent` is the next one towards the tank. Where nobody drew them, hoses are taken to carry the heads one
 * by one if there are as many, else each hose all of them. A unit of pump and tank has no test point at the
 * pump; a system without standing vacuum has none at all.
 */
export function listTestPoints(
  parts: readonly IsolationPart[],
  systemKind: SystemKind = 'pass-through',
): TestPoint[] {
  if (parts.length === 0 || systemKind === 'on-demand') return []
  const all = parts.map((part) => part.key)
  const without = (left: ReadonlySet<string>) => all.filter((key) => !left.has(key))
  const heads = parts.filter((part) => part.kind === 'head').map((part) => part.key)
  const pumps = parts.filter((part) => part.kind === 'pump').map((part) => part.key)
  const branches = headBranches(parts)
  const headSide = new Set([...heads, ...branches.flatMap((branch) => branch.parts)])
  const points: TestPoint[] = [{ kind: 'whole-boat', at: null, parts: all }]
  for (const head of heads) points.push({ kind: 'bowl-wetted', at: head, parts: without(new Set([head])) })
  points.push({ kind: 'tank-ports', at: null, parts: without(headSide) })
  if (systemKind !== 'unit') {
    for (const pump of pumps) {
      points.push({ kind: 'pump-left-out', at: pump, parts: without(new Set([pump])) })
      points.push({ kind: 'pump-inlet', at: pump, parts: [pump] })
    }
  }
  if (branches.length > 1) {
    for (const branch of branches) points.push({ kind: 'branch-capped', at: branch.at, parts: branch.parts })
  }
  for (const head of heads) points.push({ kind: 'head-off', at: head, parts: without(new Set([head])) })
  return points.filter((point) => point.parts.length > 0)
}

type Branch = { at: string; parts: string[] }

/** What hangs on each hose that leaves the tank towards heads. */
function headBranches(parts: readonly IsolationPart[]): Branch[] {
  const parents = drawnParents(parts)
  const onWayFromHead = new Set(
    parts.filter((part) => part.kind === 'head').flatMap((head) => pathOf(head.key, parents)),
  )
  const hoses = new Set(parts.filter((part) => part.kind === 'hose').map((part) => part.key))
  const branches = new Map<string, Set<string>>()
  for (const head of parts.filter((part) => part.kind === 'head')) {
    const path = pathOf(head.key, parents).filter((key) => key === head.key || hoses.has(key))
    const root = path.at(-1)
    if (root === undefined) continue
    const branch = branches.get(root) ?? new Set<string>()
    for (const key of path) branch.add(key)
    branches.set(root, branch)
  }
  const order = parts.map((part) => part.key).filter((key) => onWayFromHead.has(key))
  return [...branches].map(([at, keys]) => ({ at, parts: order.filter((key) => keys.has(key)) }))
}

/** The part itself and all on its way to the tank. */
function pathOf(key: string, parents: ReadonlyMap<string, string>): string[] {
  const path: string[] = []
  for (let at: string | undefined = key; at !== undefined && !path.includes(at); at = parents.get(at))
    path.push(at)
  return path
}

function drawnParents(parts: readonly IsolationPart[]): Map<string, string> {
  const drawn = parts.flatMap((part): [string, string][] =>
    typeof part.parent === 'string' ? [[part.key, part.parent]] : [],
  )
  if (drawn.length > 0) return new Map(drawn)
  const heads = parts.filter((part) => part.kind === 'head')
  const hoses = parts.filter((part) => part.kind === 'hose')
  if (heads.length === hoses.length) {
    return new Map(heads.map((head, index): [string, string] => [head.key, hoses[index]?.key ?? '']))
  }
  // One line after the other, the heads all at its end.
  const line = hoses.map((hose, index): [string, string] => [hose.key, hoses[index + 1]?.key ?? ''])
  const first = hoses[0]
  return new Map([
    ...line.slice(0, -1),
    ...(first === undefined ? [] : heads.map((head): [string, string] => [head.key, first.key])),
  ])
}

/** The points that are equations, as tests to choose from. */
export function possibleTests(points: readonly TestPoint[]): PossibleTest[] {
  return points
    .filter((point) => !TEST_POINTS[point.kind].isSign)
    .map((point) => ({ parts: point.parts, minutes: TEST_POINTS[point.kind].minutes }))
}
