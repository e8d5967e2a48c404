import type { BoatSpec } from '@/simulator/spec'
import type { BoatState } from '@/simulator/state'

/** What the boat's moving parts see of it while it is being simulated. They change `state` and nothing else. */
export type BoatAtWork = {
  spec: BoatSpec
  state: BoatState
  /** When it was first set going; null when it goes on from before. */
  startedAt: number | null
  vacuumNow: () => number
  ventedAt: (at: number) => boolean
  /** Keeps what has become of leaks and gas space for the truth. */
  noteChange: () => void
  /** A sample at a pump edge. */
  emitEdge: () => void
}
