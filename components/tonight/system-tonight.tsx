'use client'

import { axisMinutes, NightAxis } from '@/components/charts/night-axis'
import { NightStrip } from '@/components/charts/night-strip'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { drawnOn, finishedNights } from '@/components/nights'
import { isTroubled } from '@/components/states'
import { ago } from '@/components/time'
import { adviceFor } from '@/components/tonight/advice'
import { CupTest } from '@/components/tonight/cup-test'
import { Finding } from '@/components/tonight/finding'
import { LastNights } from '@/components/tonight/last-nights'
import { expectedMinutes, tonightOf } from '@/components/tonight/night-plan'
import { tonightReason } from '@/components/tonight/reason'
import { tonightKind, tonightSentence, type TonightFacts } from '@/components/tonight/sentences'
import { useNightOffsets } from '@/components/tonight/use-night-offsets'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import type { Nights, Outlook, Summary, System, Vessel } from '@/shared/schemas'

const MINUTE_MS = 60_000

/** One system's evening: the sentence, why, the night as it is expected, what to do, and the nights before. */
export function SystemTonight({ vessel, system }: { vessel: Vessel; system: System }) {
  const now = useNow()
  const summary = useApi<Summary>(`/api/systems/${system.id}/summary`, { refreshMs: MINUTE_MS })
  const outlook = useApi<Outlook>(`/api/systems/${system.id}/outlook`, { refreshMs: MINUTE_MS })
  const nights = useApi<Nights>(`/api/nights?systems=${system.id}&nights=8`, { refreshMs: 5 * MINUTE_MS })
  const coming = outlook.data ?? null
  const offsets = useNightOffsets(system.id, coming, vessel.quietHours, vessel.utcOffsetSeconds)
  if (summary.error) return <Trouble title={summary.error.message} retry={() => void summary.mutate()} />
  if (!summary.data || (!outlook.data && !outlook.error))
    return <Loading what={`tonight on ${vessel.name}`} />

  const name = vessel.systems.length > 1 && system.name ? `${vessel.name} (${system.name})` : vessel.name
  const facts: TonightFacts = { name, summary: summary.data, outlook: coming, offsets, nowMs: now }
  const kind = tonightKind(facts)
  const advice = adviceFor(kind)
  const listed = nights.data?.items.find((item) => item.systemId === system.id)?.nights ?? []
  const tonight = tonightOf(listed, coming, vessel.utcOffsetSeconds)
  const past = finishedNights(listed, vessel.utcOffsetSeconds, now)
  const calm = !isTroubled(summary.data.state)
  const reason = tonightReason(facts)
  return (
    <article className="grid gap-x-16 gap-y-2 lg:grid-cols-[minmax(0,38rem)_minmax(0,34rem)]">
      <div>
        <p className="text-headline tracking-[-0.022em] font-semibold" data-kind={kind}>
          <Finding phrases={tonightSentence(facts)} />
        </p>
        {reason ? <p className="mt-3 text-ink-2">{reason}</p> : null}
        {tonight ? (
          <div className="mt-5">
            <NightStrip
              night={{ ...drawnOn(tonight), expected: expectedMinutes(coming, summary.data, tonight.quiet) }}
              height={44}
              calm={calm}
              bold
              label="Tonight"
            />
            <NightAxis minutes={axisMinutes(tonight.quiet)} />
          </div>
        ) : null}
        {advice.length > 0 ? (
          <>
            <h2 className="mt-6">
              {kind === 'running-on' || kind === 'off' ? 'What to do' : 'What you can do tonight'}
            </h2>
            <ol className="mt-2 grid list-decimal gap-2 pl-5">
              {advice.map((step) => (
                <li key={step}>{step}</li>
              ))}
            </ol>
          </>
        ) : null}
        <CupTest vessel={vessel} system={system} offered={kind === 'likely' || kind === 'short-cycling'} />
      </div>
      <div>
        <h2 className="mt-6 mb-2 lg:mt-2">Last seven nights</h2>
        {past.length > 0 ? (
          <LastNights
            nights={past}
            calm={calm}
            lastHeardAt={summary.data.lastHeardAt}
            offsetSeconds={vessel.utcOffsetSeconds}
          />
        ) : (
          <p className="text-ink-2">
            No night has been heard yet. Tomorrow morning the first one stands here.
          </p>
        )}
        <p className="datum mt-4">
          {summary.data.lastHeardAt ? `Heard ${ago(summary.data.lastHeardAt, now)}. ` : ''}A monitor is no
          substitute for a bilge or gas alarm.
        </p>
      </div>
    </article>
  )
}
