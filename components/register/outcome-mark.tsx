import type { ReactNode } from 'react'
import { OUTCOME_WORDS } from '@/components/register/check-words'
import type { StepState } from '@/components/register/steps'

const SHAPES: Record<StepState, ReactNode> = {
  passed: <path d="M2 8.5l4.5 4.5L14 3.5" fill="none" stroke="currentColor" strokeWidth="2.2" />,
  failed: <path d="M3 3l10 10M13 3L3 13" stroke="currentColor" strokeWidth="2.2" />,
  'cannot-tell': (
    <circle
      cx="8"
      cy="8"
      r="5.6"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.8"
      strokeDasharray="3 2.4"
    />
  ),
  'left-out': <path d="M2.5 8h11" stroke="currentColor" strokeWidth="2.2" />,
  'under-way': <path d="M4 2.5v11l9-5.5z" fill="currentColor" />,
  open: <circle cx="8" cy="8" r="5.6" fill="none" stroke="currentColor" strokeWidth="1.6" />,
}
const INKS: Record<StepState, string> = {
  passed: 'text-sound',
  failed: 'text-attention',
  'cannot-tell': 'text-buff-ink',
  'left-out': 'text-ink-2',
  'under-way': 'text-ink',
  open: 'text-ink-2',
}

/** How a check came out: a shape of its own, told apart in grey. The word stands beside it or is read out. */
export function OutcomeMark({ state, worded = false }: { state: StepState; worded?: boolean }) {
  const word = OUTCOME_WORDS[state]
  return (
    <span className={`inline-flex items-center gap-2 ${worded ? 'font-semibold' : ''}`}>
      <svg
        width="16"
        height="16"
        viewBox="0 0 16 16"
        aria-hidden="true"
        className={`shrink-0 ${INKS[state]}`}
      >
        {SHAPES[state]}
      </svg>
      {worded ? word : <span className="sr-only">{word}: </span>}
    </span>
  )
}
