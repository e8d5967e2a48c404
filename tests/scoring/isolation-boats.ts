import type { IsolationPart, IsolationTest } from '@/lib/analysis/isolation'
import { partPriors } from '@/lib/analysis/isolation'
import type { Random } from '@/lib/analysis/statistics'
import { inHgToPa } from '@/shared/units'

export type Boat = { parts: IsolationPart[]; flows: Map<string, number>; leaking: string[]; gaugePa: number }

const between = (random: Random, low: number, high: number) => low + random() * (high - low)
const logBetween = (random: Random, low: number, high: number) => low * Math.pow(high / low, random())

/** A boat of one to three heads, each on its own hose, with a tank, switch and pump. */
function drawParts(random: Random, heads: number): IsolationPart[] {
  const branches = Array.from({ length: heads }, (_, index): IsolationPart[] => [
    { key: `hose-${index + 1}`, kind: 'hose', volumeM3: between(random, 0.002, 0.008), parent: 'tank' },
    {
      key: `head-${index + 1}`,
      kind: 'head',
      volumeM3: between(random, 0.0002, 0.0006),
      parent: `hose-${index + 1}`,
    },
  ])
  return [
    { key: 'tank', kind: 'tank', volumeM3: between(random, 0.01, 0.045) },
    { key: 'switch', kind: 'switch', volumeM3: 0.00002, parent: 'tank' },
    { key: 'pump', kind: 'pump', volumeM3: between(random, 0.0003, 0.0009), parent: 'tank' },
    ...branches.flat(),
  ]
}

/** Parts drawn by the prior; a second leak, if any, elsewhere and a share of the first. */
export function drawBoat(random: Random, second: { low: number; high: number } | null): Boat {
  const parts = drawParts(random, 1 + Math.floor(random() * 3))
  const first = drawByPrior(parts, random, [])
  const volumeM3 = parts.reduce((sum, part) => sum + part.volumeM3, 0)
  // Holds of ten minutes to three hours at a differential of two inches.
  const flow = (volumeM3 * inHgToPa(2)) / logBetween(random, 600, 10_800)
  const flows = new Map([[first, flow]])
  const leaking = [first]
  if (second !== null) {
    // Tank and switch are never parted by a test: not two leaks that could be named.
    const taken = first === 'tank' || first === 'switch' ? ['tank', 'switch'] : [first]
    const other = drawByPrior(parts, random, taken)
    flows.set(other, flow * between(random, second.low, second.high))
    leaking.push(other)
  }
  return { parts, flows, leaking, gaugePa: inHgToPa(logBetween(random, 0.01, 0.1)) }
}

function drawByPrior(parts: readonly IsolationPart[], random: Random, taken: readonly string[]): string {
  const open = [...partPriors(parts)].filter(([key]) => !taken.includes(key))
  let left = random() * open.reduce((sum, [, weight]) => sum + weight, 0)
  const found = open.find(([, weight]) => (left -= weight) < 0)
  return (found ?? open.at(-1) ?? [''])[0]
}

/** A test made on a boat: the vacuum decays by an orifice's law, and is read in steps of the gauge. */
export function makeTest(
  boat: Boat,
  keys: readonly string[],
  seconds: number,
  resolutionPa: number,
  random: Random,
): IsolationTest {
  const volumeM3 = boat.parts.reduce((sum, part) => (keys.includes(part.key) ? sum + part.volumeM3 : sum), 0)
  const flow = keys.reduce((sum, key) => sum + (boat.flows.get(key) ?? 0), 0)
  const topPa = inHgToPa(between(random, 9.5, 10.5))
  const endPa = decay(topPa, flow, volumeM3, seconds)
  const read = (pa: number) => Math.max(0, Math.round(pa / resolutionPa) * resolutionPa)
  return { parts: keys, startPa: read(topPa), endPa: read(endPa), seconds, resolutionPa }
}

/** Vacuum after a time: inflow through a hole, as √(vacuum) near nought and nearly level above. */
function decay(topPa: number, flow: number, volumeM3: number, seconds: number): number {
  let vacuumPa = topPa
  const steps = 200
  for (let step = 0; step < steps && vacuumPa > 0; step += 1) {
    const ratio = Math.min(1, 1 - vacuumPa / 101_325)
    const drive = (pressureRatio: number) =>
      Math.sqrt(Math.max(0, Math.pow(pressureRatio, 1.4286) - Math.pow(pressureRatio, 1.7143)))
    const relative = drive(Math.max(0.5283, ratio)) / drive(1 - topPa / 101_325)
    vacuumPa = Math.max(0, vacuumPa - ((flow / volumeM3) * relative * seconds) / steps)
  }
  return vacuumPa
}
