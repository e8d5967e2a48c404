import { BLOCK_MS, CHECKPOINT_AT_LEAST_MS } from './constants'
import type { FoldState } from './state'
import type { Instant } from './types'

/**
 * Whether the state as it is now, right after a step, is to be kept as a checkpoint: at the first hold start
 * of each 6 h block of UTC, or at a block's first sample after 24 h without one. The state itself remembers
 * the block, so that replays make the same ones.
 */
export function checkpointDue(state: FoldState): boolean {
  return state.checkpoint.due
}

/** The 6 h block of UTC that an instant lies in, as its first instant. */
export const blockStart = (at: Instant): Instant => Math.floor(at / BLOCK_MS) * BLOCK_MS

/** Decides after each sample; `previousAt` is the sample before it. */
export function markCheckpoint(
  state: FoldState,
  at: Instant,
  previousAt: Instant | null,
  holdBegan: boolean,
): void {
  const { checkpoint } = state
  const block = Math.floor(at / BLOCK_MS)
  checkpoint.at ??= at
  checkpoint.due = false
  if (checkpoint.block !== null && block <= checkpoint.block) return
  const opensBlock = previousAt === null || Math.floor(previousAt / BLOCK_MS) < block
  if (!holdBegan && !(opensBlock && at - checkpoint.at >= CHECKPOINT_AT_LEAST_MS)) return
  checkpoint.due = true
  checkpoint.block = block
  checkpoint.at = at
}
