import type { FlushRow, HoldRow, Instant, LegRow, RunRow } from '../fold/types'
import type { Figures } from '../figures/types'
import type { OffsetSpan } from '../outlook/types'

/** Families of parts and causes that the record can point at, by their generic names. */
export type Family =
  | 'bowl-valve'
  | 'bowl-seal'
  | 'check-valve'
  | 'fixed-fitting'
  | 'hose-or-clamp'
  | 'switch'
  | 'pump'
  | 'supply'
  | 'gas-space'
  | 'handled'

export type PartKind = 'head' | 'hose' | 'tank' | 'switch' | 'pump'

export interface Suspect {
  family: Family
  /** How much likelier than before, as a factor on the prior of its parts (judged; refitted from what visits find). */
  strength: number
  /** In words, with the counts: "changes only after flushes, 21 of 23". */
  basis: string
  overturnedBy: string
}

export type SignatureName =
  | 'changes-across-flushes'
  | 'seal-drying'
  | 'cup-test'
  | 'signs-together'
  | 'plateau'
  | 'past-cut-out'
  | 'chatter'
  | 'late-seating'
  | 'follows-temperature'
  | 'under-way'
  | 'somebody-touched-it'

/** What one signature says: suspects (none = it was looked for and is not there), or what is missing to say. */
export type SignatureFinding =
  | { signature: SignatureName; enough: true; suspects: Suspect[] }
  | { signature: SignatureName; enough: false; missing: string }

/** The cup test on the owner's phone: rates with their standard errors, Pa/h, before, after water, after a flush. */
export interface CupTest {
  headName: string
  before: { paPerHour: number; sigma: number }
  wet: { paPerHour: number; sigma: number }
  /** After the next flush of that bowl; null = not done. */
  after: { paPerHour: number; sigma: number } | null
}

export interface StepSpan {
  between: readonly [Instant, Instant]
  fromPaPerHour: number
  toPaPerHour: number
}

export interface SignatureInput {
  at: Instant
  legs: readonly LegRow[]
  runs: readonly RunRow[]
  holds: readonly HoldRow[]
  flushes: readonly FlushRow[]
  figures: Pick<Figures, 'state' | 'signs' | 'cutOutPa' | 'cutInPa' | 'settledPa'>
  standardPressurePa: number
  steps: readonly StepSpan[]
  cupTests: readonly CupTest[]
  offsets: readonly OffsetSpan[]
}
