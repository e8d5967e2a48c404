'use client'

import type { Span } from '@/components/charts/plot-options'
import { panned, STRETCHES, zoomed } from '@/components/vessel/record/range'

const BUTTON =
  'min-h-11 rounded-sm border border-field px-2.5 hover:bg-shallow sm:min-h-9 aria-pressed:border-ink aria-pressed:font-semibold aria-pressed:inset-shadow-[0_-2px_0_var(--ink)]'

/** Stretches by one press, closer, wider, earlier, later: all that the wheel and a drag do, for everybody. */
export function RangeControls({
  range,
  nowMs,
  setRange,
}: {
  range: Span
  nowMs: number
  setRange: (range: Span | null) => void
}) {
  const length = range.toMs - range.fromMs
  const moves: { label: string; sign: string; to: () => Span }[] = [
    { label: 'Closer', sign: '+', to: () => zoomed(range, 0.5, 0.5, nowMs) },
    { label: 'Wider', sign: '−', to: () => zoomed(range, 2, 0.5, nowMs) },
    { label: 'Earlier', sign: '←', to: () => panned(range, -0.5, nowMs) },
    { label: 'Later', sign: '→', to: () => panned(range, 0.5, nowMs) },
  ]
  return (
    <div className="no-print flex flex-wrap gap-1.5" role="group" aria-label="Stretch of time">
      {STRETCHES.map((stretch) => (
        <button
          key={stretch.label}
          type="button"
          className={BUTTON}
          aria-pressed={
            Math.abs(length - stretch.ms) < stretch.ms * 0.01 && nowMs - range.toMs < length * 0.05
          }
          onClick={() => setRange({ fromMs: nowMs - stretch.ms, toMs: nowMs })}
        >
          {stretch.label}
        </button>
      ))}
      <span className="w-2" />
      {moves.map((move) => (
        <button
          key={move.label}
          type="button"
          className={BUTTON}
          aria-label={move.label}
          onClick={() => setRange(move.to())}
        >
          <span aria-hidden="true" className="figure">
            {move.sign}
          </span>
        </button>
      ))}
    </div>
  )
}
