import { HOLD_TICKS, holdPosition } from '@/components/charts/scales'
import { STATE_TONES, type SystemState } from '@/components/states'
import type { HoldTime } from '@/shared/schemas'

const percent = (seconds: number): string => `${holdPosition(seconds) * 100}%`

/** Dotted line at the limit, full line at the aim, as tall as the cell: in a column they join into two lines. */
export function HoldLines({
  limitSeconds = 10_800,
  aimSeconds = 28_800,
}: {
  limitSeconds?: number
  aimSeconds?: number
}) {
  return (
    <>
      <span
        className="absolute inset-y-0 w-px bg-[repeating-linear-gradient(var(--ink-2)_0_2px,transparent_2px_5px)]"
        style={{ left: percent(limitSeconds) }}
      />
      <span className="absolute inset-y-0 border-l border-ink-2" style={{ left: percent(aimSeconds) }} />
    </>
  )
}

/**
 * One boat on the hold axis: a stroke at its hold time over the band of its interval. A bound ("at least")
 * is an arrow that points to where the truth lies.
 */
export function HoldMark({ holdTime, state }: { holdTime: HoldTime; state: SystemState }) {
  const colour = `var(--${STATE_TONES[state]})`
  const at = percent(holdTime.seconds)
  if (holdTime.bound === 'at-least') {
    return (
      <svg
        className="absolute inset-y-0 my-auto overflow-visible"
        style={{ left: at }}
        width="30"
        height="18"
        aria-hidden="true"
      >
        <path d="M0 1v16" stroke={colour} strokeWidth="3.5" />
        <path d="M2 9h24M20 4l6 5-6 5" fill="none" stroke={colour} strokeWidth="1.8" />
      </svg>
    )
  }
  const low = holdPosition(holdTime.low ?? holdTime.seconds)
  const high = holdPosition(holdTime.high ?? holdTime.seconds)
  return (
    <>
      <span
        className="absolute inset-y-0 my-auto h-[7px] opacity-40"
        style={{ left: `${low * 100}%`, width: `${Math.max(0, high - low) * 100}%`, background: colour }}
      />
      <span
        className="absolute inset-y-0 my-auto h-[18px] w-[3.5px] -translate-x-1/2"
        style={{ left: at, background: colour }}
      />
    </>
  )
}

/** The axis that heads a column of hold marks. */
export function HoldAxis() {
  return (
    <div className="relative h-4 text-note leading-4" aria-hidden="true">
      {HOLD_TICKS.map((tick) => (
        <span
          key={tick.seconds}
          className="absolute -translate-x-1/2 whitespace-nowrap"
          style={{ left: percent(tick.seconds) }}
        >
          {tick.label}
        </span>
      ))}
    </div>
  )
}
