import { permutationTest } from '../statistics'
import { legScales, mean } from './leg-scales'
import type { SignatureFinding, SignatureInput } from './types'

/** Over this an alternator is charging: the nearest that these channels come to "under way". */
const CHARGING_V = 13.5
const FEWEST = 5

/**
 * Is the leak higher under way, that is, while the engine charges? Then something that motion moves. Fewer than 5
 * legs either way: not enough. A charger on shore power looks the same, and the words say so.
 */
export function underWay(input: SignatureInput): SignatureFinding {
  const signature = 'under-way' as const
  const volts = new Map(input.runs.map((run) => [run.stoppedAt, run.supplyV]))
  const scales = legScales(input.legs, input.standardPressurePa)
  const groups = { charging: [] as number[], resting: [] as number[] }
  for (const { leg, logScale } of scales) {
    const supplyV = volts.get(leg.holdStartedAt) ?? null
    if (supplyV !== null) (supplyV > CHARGING_V ? groups.charging : groups.resting).push(logScale)
  }
  if (groups.charging.length < FEWEST || groups.resting.length < FEWEST) {
    return { signature, enough: false, missing: `${FEWEST} holds charging and ${FEWEST} at rest` }
  }
  const test = permutationTest(groups.charging, groups.resting, (a, b) => mean(a) - mean(b), {
    permutations: 999,
  })
  if (test === null || test.pValue > 0.01 || test.observed < 0.2)
    return { signature, enough: true, suspects: [] }
  const factor = Math.exp(test.observed).toFixed(1)
  const basis = `${factor} times the leak while the supply is charged (engine, or a charger)`
  return {
    signature,
    enough: true,
    suspects: [
      { family: 'hose-or-clamp', strength: 2, basis, overturnedBy: 'the same at the berth on the charger' },
    ],
  }
}
