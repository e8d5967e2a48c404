'use client'

import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { useUnits } from '@/components/shell/units-context'
import { ago } from '@/components/time'
import { Trouble } from '@/components/ui/sheet-states'
import type { LiveReadings } from '@/shared/schemas'
import { formatTemperature, formatVacuum, UNKNOWN, type VacuumUnit } from '@/shared/units'

const DECIMALS: Record<VacuumUnit, number> = { inHg: 2, kPa: 2, mbar: 1 }

/** What the logger sends now, as it arrives. */
export function LiveLine({ id }: { id: string }) {
  const now = useNow(1_000)
  const { units } = useUnits()
  const { data, error } = useApi<LiveReadings>(`/api/commissionings/${id}/live`, {
    refreshMs: 2_000,
    keepPrevious: true,
  })
  if (error && !data) return <Trouble title={error.message} />
  const newest = data?.newest
  const at = newest?.at ?? null
  return (
    <section aria-label="What the logger sends" className="border-y border-line py-3">
      <p className="flex items-center gap-2">
        <span
          className={`inline-block h-2 w-6 ${at === null ? 'bg-shoal' : 'live bg-act'}`}
          aria-hidden="true"
        />
        {at === null ? (
          waitingWords(data?.lastHeardAt ?? null, now)
        ) : (
          <span>
            Last reading {ago(at, now)}
            {data?.clockOffsetSeconds == null ? '' : `; its clock is ${clockWords(data.clockOffsetSeconds)}`}
          </span>
        )}
      </p>
      <dl className="mt-2 grid grid-cols-2 gap-x-6 gap-y-2 sm:grid-cols-4">
        <Figure name="Vacuum" value={formatVacuum(newest?.vacuumPa, units.vacuum, DECIMALS[units.vacuum])} />
        <Figure name="Pump" value={newest?.pumpOn == null ? UNKNOWN : newest.pumpOn ? 'on' : 'off'} />
        <Figure name="Air" value={formatTemperature(newest?.airC, units.temperature, 1)} />
        <Figure name="Supply" value={newest?.supplyV == null ? UNKNOWN : `${newest.supplyV.toFixed(1)} V`} />
      </dl>
      {data && data.runs.length > 0 ? (
        <p className="datum mt-2">
          {data.runs.length === 1 ? 'One start' : `${data.runs.length} starts`} of the pump seen since this
          check began{data.runs.at(-1)?.stoppedAt === null ? '; it is on.' : '; it has stopped.'}
        </p>
      ) : null}
    </section>
  )
}

function Figure({ name, value }: { name: string; value: string }) {
  return (
    <div>
      <dt className="datum">{name}</dt>
      <dd className="figure text-lead">{value}</dd>
    </div>
  )
}

const waitingWords = (lastHeardAt: string | null, nowMs: number): string =>
  lastHeardAt === null
    ? 'Waiting for the first reading.'
    : `Nothing from the last ten minutes; last heard ${ago(lastHeardAt, nowMs)}.`

/** "right", or by how much it is off. */
export function clockWords(offsetSeconds: number): string {
  const off = Math.abs(Math.round(offsetSeconds))
  if (off < 5) return 'right'
  const length = off < 120 ? `${off} s` : `${Math.round(off / 60)} min`
  return `${length} ${offsetSeconds > 0 ? 'ahead' : 'behind'}`
}
