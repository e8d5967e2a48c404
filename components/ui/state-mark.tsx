import type { ReactNode } from 'react'
import { STATE_TONES, STATE_WORDS, type SystemState } from '@/components/states'

/** One shape a state, told apart in grey and by every eye: drawn on a 20 × 16 field. */
const SHAPES: Record<SystemState, ReactNode> = {
  tight: <rect x="1" y="5" width="18" height="6" fill="currentColor" />,
  weeping: (
    <>
      <rect x="1.8" y="5.8" width="16.4" height="4.4" fill="none" stroke="currentColor" strokeWidth="1.6" />
      <rect x="1" y="5" width="11" height="6" fill="currentColor" />
    </>
  ),
  leaking: (
    <>
      <rect x="1.8" y="5.8" width="16.4" height="4.4" fill="none" stroke="currentColor" strokeWidth="1.6" />
      <rect x="1" y="5" width="5.5" height="6" fill="currentColor" />
    </>
  ),
  'short-cycling': (
    <path d="M1 3h3v10H1zM6.3 3h3v10h-3zM11.6 3h3v10h-3zM16.9 3h2.6v10h-2.6z" fill="currentColor" />
  ),
  'running-on': (
    <>
      <rect x="1" y="1" width="18" height="14" fill="currentColor" />
      <path d="M7 4l7 4-7 4z" fill="var(--water)" />
    </>
  ),
  off: (
    <>
      <circle cx="10" cy="8" r="5.6" fill="none" stroke="currentColor" strokeWidth="1.6" />
      <path d="M4.4 13.6L15.6 2.4" stroke="currentColor" strokeWidth="1.6" />
    </>
  ),
  'laid-up': (
    <>
      <path d="M1 4h18l-4 5H5z" fill="currentColor" />
      <path d="M6.2 9v5M13.8 9v5M3.5 14.2h13" fill="none" stroke="currentColor" strokeWidth="1.5" />
    </>
  ),
  'worked-on': (
    <>
      <circle cx="10" cy="8" r="6.2" fill="none" stroke="currentColor" strokeWidth="1.6" />
      <path d="M10 8l3.4-3.6" stroke="currentColor" strokeWidth="1.8" />
      <circle cx="10" cy="8" r="1.4" fill="currentColor" />
    </>
  ),
  learning: <path d="M1.5 12.5L18.5 3.5" stroke="currentColor" strokeWidth="1.8" />,
  unheard: (
    <rect
      x="1.7"
      y="4.7"
      width="16.6"
      height="6.6"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.5"
      strokeDasharray="2.6 2.4"
    />
  ),
}

const INKS: Record<string, string> = {
  attention: 'text-attention',
  'buff-ink': 'text-buff-ink',
  sound: 'text-sound',
  ink: 'text-ink',
  'ink-2': 'text-ink-2',
}

/** The mark alone, for places where the word stands beside it. */
export function StateMark({ state, size = 20 }: { state: SystemState; size?: number }) {
  return (
    <svg
      width={size}
      height={(size * 16) / 20}
      viewBox="0 0 20 16"
      aria-hidden="true"
      className={`${INKS[STATE_TONES[state]]} inline-block shrink-0`}
      data-state={state}
    >
      {SHAPES[state]}
    </svg>
  )
}

/** Mark and word together: never colour alone. */
export function StateLabel({ state, word = STATE_WORDS[state] }: { state: SystemState; word?: string }) {
  return (
    <span className="inline-flex items-center gap-2 font-semibold">
      <StateMark state={state} />
      {word}
    </span>
  )
}
