import { PA_PER_INHG } from '@/shared/units'
import type { SignatureFinding, SignatureInput } from './types'

const RECENT_MS = 7 * 86_400_000
const PAST_PA = PA_PER_INHG
const CHATTER_MS = 5_000

/** Runs that went past the cut-out by 1 inHg: switch, sense line or wiring. Under 5 runs with a vacuum: not enough. */
export function pastCutOut({ runs, figures, at }: SignatureInput): SignatureFinding {
  const signature = 'past-cut-out' as const
  const stops = runs
    .filter((run) => run.stoppedAt > at - RECENT_MS)
    .flatMap((run) => run.vacuumAtStopPa ?? [])
  const { cutOutPa } = figures
  if (stops.length < 5 || cutOutPa === null)
    return { signature, enough: false, missing: 'five runs with a vacuum' }
  const past = stops.filter((pa) => pa > cutOutPa + PAST_PA).length
  if (past < 2) return { signature, enough: true, suspects: [] }
  const basis = `the pump went past the cut-out by an inch, ${past} of ${stops.length} runs`
  return {
    signature,
    enough: true,
    suspects: [
      { family: 'switch', strength: 5, basis, overturnedBy: 'a hand gauge at the switch that stays under' },
    ],
  }
}

/** Starts under 5 s after a stop: the switch chatters. Fewer than 5 runs: not enough. */
export function chatter({ runs, at }: SignatureInput): SignatureFinding {
  const signature = 'chatter' as const
  const recent = runs
    .filter((run) => run.stoppedAt > at - RECENT_MS)
    .sort((a, b) => a.startedAt - b.startedAt)
  if (recent.length < 5) return { signature, enough: false, missing: 'five runs' }
  const quick = recent.filter((run, index) => {
    const before = recent[index - 1]
    return before !== undefined && run.startedAt - before.stoppedAt < CHATTER_MS
  }).length
  if (quick < 3) return { signature, enough: true, suspects: [] }
  const basis = `${quick} of ${recent.length} starts under 5 s after a stop`
  return {
    signature,
    enough: true,
    suspects: [{ family: 'switch', strength: 6, basis, overturnedBy: 'a loose wire found elsewhere' }],
  }
}
