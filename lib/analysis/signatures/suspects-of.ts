import { changesAcrossFlushes } from './changes-across-flushes'
import { cupTest } from './cup-test'
import { followsTemperature } from './follows-temperature'
import { lateSeating } from './late-seating'
import { plateau } from './plateau'
import { sealDrying } from './seal-drying'
import { signsTogether } from './signs-together'
import { somebodyTouchedIt } from './somebody-touched-it'
import { chatter, pastCutOut } from './switch-faults'
import type { Family, PartKind, SignatureFinding, SignatureInput, SignatureName } from './types'
import { underWay } from './under-way'

const SIGNATURES: readonly ((input: SignatureInput) => SignatureFinding)[] = [
  changesAcrossFlushes,
  sealDrying,
  cupTest,
  signsTogether,
  plateau,
  pastCutOut,
  chatter,
  lateSeating,
  followsTemperature,
  underWay,
  somebodyTouchedIt,
]

/** Where each family's parts sit, for the priors of an isolation; none = not a part that a plug can find. */
export const KINDS_OF_FAMILY: Readonly<Record<Family, readonly PartKind[]>> = {
  'bowl-valve': ['head'],
  'bowl-seal': ['head'],
  'check-valve': ['pump'],
  'fixed-fitting': ['hose', 'tank', 'switch'],
  'hose-or-clamp': ['hose'],
  switch: ['switch'],
  pump: ['pump'],
  supply: [],
  'gas-space': [],
  handled: ['hose', 'tank'],
}

export interface FamilySuspect {
  family: Family
  /** Product of the strengths of all signatures that name it; over 1 likelier, under 1 less likely. */
  factor: number
  basis: string[]
  overturnedBy: string[]
}

export interface RecordSuspects {
  /** The likeliest first, three at most. */
  families: FamilySuspect[]
  /** Named less likely by a signature. */
  cleared: FamilySuspect[]
  notEnough: { signature: SignatureName; missing: string }[]
  /** What readings cannot tell apart, to be said beside it. */
  inseparable: readonly string[]
}

const INSEPARABLE = [
  'one fixed fitting from another',
  'a base gasket from a clamp',
  'two like heads',
  'switched off from failed, without a voltage on the pump’s side of the breaker',
] as const

/**
 * What the record says before anybody goes: every signature, its strengths multiplied by family, the three
 * likeliest. An empty record names nobody and says what is missing.
 */
export function suspectsOf(input: SignatureInput): RecordSuspects {
  const findings = SIGNATURES.map((signature) => signature(input))
  const families = new Map<Family, FamilySuspect>()
  for (const finding of findings) {
    if (!finding.enough) continue
    for (const { family, strength, basis, overturnedBy } of finding.suspects) {
      const entry = families.get(family) ?? { family, factor: 1, basis: [], overturnedBy: [] }
      entry.factor *= strength
      entry.basis.push(basis)
      entry.overturnedBy.push(overturnedBy)
      families.set(family, entry)
    }
  }
  const all = [...families.values()].sort((a, b) => b.factor - a.factor)
  return {
    families: all.filter((each) => each.factor > 1).slice(0, 3),
    cleared: all.filter((each) => each.factor < 1),
    notEnough: findings.flatMap((finding) =>
      finding.enough ? [] : [{ signature: finding.signature, missing: finding.missing }],
    ),
    inseparable: INSEPARABLE,
  }
}

/**
 * Factors on the isolation's priors from what the record says, by part key: the three likeliest families'
 * factors on their kinds, the strongest where several name one kind. Parts that nothing names stay out (1).
 */
export function priorFactorsOf(
  suspects: RecordSuspects,
  parts: readonly { key: string; kind: PartKind }[],
): Record<string, number> {
  const byKind = new Map<PartKind, number>()
  for (const { family, factor } of suspects.families) {
    for (const kind of KINDS_OF_FAMILY[family]) byKind.set(kind, Math.max(byKind.get(kind) ?? 1, factor))
  }
  return Object.fromEntries(
    parts.flatMap((part) => {
      const factor = byKind.get(part.kind)
      return factor === undefined ? [] : [[part.key, factor]]
    }),
  )
}
