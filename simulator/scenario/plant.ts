import type { HeadSpec } from '@/simulator/habits'
import { PA_PER_INHG } from '@/simulator/physics/constants'
import { leakFactorAt, freshCondition } from '@/simulator/physics/leaks'
import type { BoatSpec } from '@/simulator/spec'

export type PartKind = 'head' | 'hose' | 'tank' | 'switch' | 'pump'
export type ScenarioPart = {
  key: string
  kind: PartKind
  name: string
  volumeM3: number
  parent: string | null
}

/** A tank with pump, switch and one branch a head, drawn as its parts; their volumes add up to the system's. */
export function partsOf(volumeM3: number, headNames: readonly string[]): ScenarioPart[] {
  const rounded = (share: number): number => Math.round(share * volumeM3 * 1e5) / 1e5
  const branch = 0.26 / headNames.length
  return [
    { key: 'tank', kind: 'tank', name: 'Vacuum tank', volumeM3: rounded(0.66), parent: null },
    { key: 'switch', kind: 'switch', name: 'Switch and sense line', volumeM3: rounded(0.01), parent: 'tank' },
    { key: 'pump', kind: 'pump', name: 'Pump and check valves', volumeM3: rounded(0.03), parent: 'tank' },
    { key: 'suction', kind: 'hose', name: 'Suction hose', volumeM3: rounded(0.04), parent: 'tank' },
    ...headNames.flatMap((name, index): ScenarioPart[] => [
      {
        key: `hose-${index + 1}`,
        kind: 'hose',
        name: `Hose to ${name.toLowerCase()}`,
        volumeM3: rounded(branch * 0.9),
        parent: 'tank',
      },
      {
        key: `head-${index + 1}`,
        kind: 'head',
        name,
        volumeM3: rounded(branch * 0.1),
        parent: `hose-${index + 1}`,
      },
    ]),
  ]
}

/** The heads themselves, the first used most; a flush of `dropInHg` from a full tank. */
export const headsOf = (volumeM3: number, count: number, dropInHg: number): HeadSpec[] =>
  Array.from({ length: count }, (_, index) => ({
    key: `head-${index + 1}`,
    weight: index === 0 ? 2 : 1,
    airLitres: (1000 * dropInHg * PA_PER_INHG * volumeM3) / 101_325,
    waterLitres: 0.6,
  }))

export type ScenarioGaugeTest = {
  startedAt: number
  endedAt: number
  partKeys: string[]
  startPa: number
  endPa: number
  resolutionPa: number
}

/** What a digital gauge on these parts alone reads at an instant: their leaks into their own volume. */
export function gaugeTestOf(
  boat: BoatSpec,
  parts: readonly ScenarioPart[],
  partKeys: readonly string[],
  startedAt: number,
  minutes: number,
  startInHg: number,
): ScenarioGaugeTest {
  const resolutionPa = 0.1 * PA_PER_INHG
  const read = (pa: number): number => Math.max(0, Math.round(pa / resolutionPa) * resolutionPa)
  const inTest = new Set(partKeys)
  const volume = parts.reduce((sum, part) => sum + (inTest.has(part.key) ? part.volumeM3 : 0), 0)
  const flow = boat.leaks
    .filter((leak) => inTest.has(leak.part))
    .reduce((sum, leak) => sum + leak.flowPaM3PerS * leakFactorAt(leak, freshCondition(), startedAt), 0)
  const startPa = startInHg * PA_PER_INHG
  return {
    startedAt,
    endedAt: startedAt + minutes * 60_000,
    partKeys: [...partKeys],
    startPa: read(startPa),
    endPa: read(startPa - (flow / volume) * minutes * 60),
    resolutionPa,
  }
}
