import type { HoldTimeEstimate } from '../hold-time'
import { stateByHoldTime } from './state'
import type { FiguresInput, SystemState } from './types'

interface Witness {
  startedAt: number
  /** What this hold alone says the hold time is, s, at the least and at the most. */
  least: number
  most: number
}

/**
 * Since when a state by hold time has been so: going back from the newest hold, the start of the first of an
 * unbroken row of holds none of which speaks against it, within the rows that were loaded. While learning, the
 * start of the record. Nothing to go by: null.
 */
export function sinceOfState(
  input: FiguresInput,
  state: SystemState,
  hold: HoldTimeEstimate | null,
): number | null {
  const starts = [...input.rows.runs, ...input.rows.holds].map((row) => row.startedAt)
  if (hold === null || state === 'learning') return starts.length === 0 ? null : Math.min(...starts)
  const witnesses = witnessesOf(input, hold).sort((a, b) => b.startedAt - a.startedAt)
  let since: number | null = null
  let against = 0
  for (const witness of witnesses) {
    const agrees = canBe(witness, state, input.settings)
    // One hold by itself may be a flush not seen; two in a row are another state.
    against = agrees ? 0 : against + 1
    if (against >= 2) break
    if (agrees) since = witness.startedAt
  }
  return since ?? (starts.length === 0 ? null : Math.max(...starts))
}

function witnessesOf({ rows }: FiguresInput, hold: HoldTimeEstimate): Witness[] {
  const share = hold.seconds / Math.max(1, hold.model.observedHoldSeconds)
  const whole = rows.holds
    .filter((row) => !row.setAside && row.flushes === 0 && row.ending !== 'interrupted')
    .map((row) => {
      const seconds = ((row.endedAt - row.startedAt) / 1000) * share
      return row.ending === 'leak'
        ? { startedAt: row.startedAt, least: 0.85 * seconds, most: 1.15 * seconds }
        : { startedAt: row.startedAt, least: seconds, most: Infinity }
    })
  return whole
}

const BY_HOLD_TIME: readonly SystemState[] = ['short-cycling', 'leaking', 'weeping', 'tight']

function canBe(
  witness: Witness,
  state: SystemState,
  settings: { limitSeconds: number; aimSeconds: number },
): boolean {
  const rank = (seconds: number) => BY_HOLD_TIME.indexOf(stateByHoldTime({ seconds, bound: null }, settings))
  const own = BY_HOLD_TIME.indexOf(state)
  return rank(witness.least) <= own && own <= rank(witness.most)
}
