import { HoldAxis, HoldLines, HoldMark } from '@/components/charts/hold-scale'
import { axisMinutes, NightAxis } from '@/components/charts/night-axis'
import { NightStrip } from '@/components/charts/night-strip'
import { holdWords } from '@/components/figures'
import { holdEvidence, stripEvidence } from '@/components/notices/evidence-shapes'
import type { Notice } from '@/shared/schemas'

/** What a notice rests on, drawn: the night that was foretold, or the hold time against its limit. */
export function EvidenceChart({ notice }: { notice: Notice }) {
  const strip = stripEvidence(notice.evidence)
  if (strip) {
    return (
      <figure className="mt-3 max-w-[34rem]">
        <NightStrip
          night={{ quiet: strip.quiet, runs: [], flushes: [], expected: strip.expected }}
          height={30}
          bold
          label="The night as it was foretold"
        />
        <NightAxis minutes={axisMinutes(strip.quiet)} />
      </figure>
    )
  }
  const hold = holdEvidence(notice.evidence)
  if (!hold) return null
  const state = notice.kind === 'short-cycling' ? 'short-cycling' : 'leaking'
  return (
    <figure
      className="mt-3 max-w-[34rem] px-5"
      role="img"
      aria-label={`Holds ${holdWords(hold.holdTime)}; dotted the limit`}
    >
      <div className="relative h-9 border-b border-line">
        <HoldLines limitSeconds={hold.limitSeconds} />
        <HoldMark holdTime={hold.holdTime} state={state} />
      </div>
      <div className="text-ink-2">
        <HoldAxis />
      </div>
    </figure>
  )
}
