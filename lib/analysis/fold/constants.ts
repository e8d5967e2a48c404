import { PA_PER_INHG } from '@/shared/units'

/** Raised whenever the same samples would give other rows: stored states of another version are derived anew. */
export const DERIVER_VERSION = 1

export const INHG = PA_PER_INHG
export const SECOND = 1_000
export const MINUTE = 60_000
export const HOUR = 3_600_000

/** Usual pressure switch, where neither set-up nor readings tell (common practice, no source). */
export const DEFAULT_CUT_OUT_PA = 10 * INHG
export const DEFAULT_CUT_IN_PA = 8 * INHG
/** What the gas takes back while it warms after a stop (judged). */
export const DEFAULT_SETTLING_PA = 0.2 * INHG

export const RING_LENGTH = 21
/** Below this many learned values the set-up's figure serves. */
export const RING_ENOUGH = 5
/** A reading is the switch's only when the samples beside the edge are this close. */
export const CLOSE_SAMPLES_MS = 30 * SECOND

export const DEFAULT_INTERVAL_SECONDS = 60
/** Silence that breaks a hold: at least this, and at least so many intervals. */
export const GAP_AT_LEAST_MS = 10 * MINUTE
export const GAP_INTERVALS = 5
/** Air and barometer are taken to hold for this long after they were measured. */
export const CARRY_MS = 15 * MINUTE
/** Over a longer silence of the air probe its lagged copies start afresh. */
export const LAG_RESTART_MS = 2 * HOUR
/** A pump channel that was silent for so long is gone, and the vacuum alone is read. */
export const PUMP_LOST_MS = 24 * HOUR
/** A logger that should have a pump channel is given so long to show it. */
export const PUMP_AWAITED_MS = HOUR

/** Bins of a leg: at most so many, the narrowest so wide. Fewer than 120 keeps the state under 8 kB. */
export const MAX_BINS = 88
export const FIRST_BIN_SECONDS = 15
/** Dropped after a stop or a flush, while the gas settles; twice that after a deep recharge. */
export const SETTLING_SECONDS = 90
export const DEEP_SETTLING_SECONDS = 240

export const FLUSH_PA = 0.5 * INHG
export const TAP_PA = 0.1 * INHG
export const FALL_WINDOW_MS = 30 * SECOND
/** Least fall at a start that speaks for a flush. */
export const START_FALL_PA = 0.15 * INHG

/** Vacuum so far under the cut-in, for so long, without a start: the pump is off. */
export const OFF_UNDER_PA = INHG
export const OFF_AFTER_MS = 10 * MINUTE
/** The line for "off" while no cut-in is known at all. */
export const OFF_LINE_UNKNOWN_PA = 3 * INHG

export const BLOCK_MS = 6 * HOUR
export const CHECKPOINT_AT_LEAST_MS = 24 * HOUR
