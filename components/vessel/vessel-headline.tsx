'use client'

import { useNow } from '@/components/data/use-now'
import { useUnits } from '@/components/shell/units-context'
import { Finding } from '@/components/tonight/finding'
import { useNightOffsets } from '@/components/tonight/use-night-offsets'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { StateMark } from '@/components/ui/state-mark'
import { vesselBasis, vesselFinding } from '@/components/vessel/finding'
import { useOutlook, useSummary, useTrend } from '@/components/vessel/use-figures'
import type { System, Vessel } from '@/shared/schemas'

/** The finding of a vessel's sheet, and beneath it what it rests on. */
export function VesselHeadline({ vessel, system }: { vessel: Vessel; system: System }) {
  const now = useNow()
  const { units } = useUnits()
  const summary = useSummary(system.id)
  const outlook = useOutlook(system.id)
  const trend = useTrend(system.id, now)
  const offsets = useNightOffsets(system.id, outlook.data ?? null, vessel.quietHours, vessel.utcOffsetSeconds)
  if (summary.error) return <Trouble title={summary.error.message} retry={() => void summary.mutate()} />
  if (!summary.data) return <Loading what="the figures" />
  const basis = vesselBasis(summary.data, trend.data?.steps ?? [], units.vacuum, offsets, now)
  return (
    <div>
      <p className="max-w-[36em] text-finding tracking-[-0.015em]">
        <span className="mr-2 inline-flex align-baseline">
          <StateMark state={summary.data.state} size={24} />
        </span>
        <Finding phrases={vesselFinding(summary.data, outlook.data ?? null, offsets, now)} />
      </p>
      {basis ? <p className="mt-1.5 max-w-[58em] text-ink-2">{basis}</p> : null}
    </div>
  )
}
