'use client'

import { AboardCalendar } from '@/components/account/aboard-calendar'
import { LayUpForm } from '@/components/account/lay-up-form'
import { useApi } from '@/components/data/use-api'
import { Section } from '@/components/joining/section'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import type { Me } from '@/shared/schemas'

/** When somebody sleeps aboard, boat by boat, and the lay-up of one or many. */
export function AboardSheet() {
  const { data: me, error, mutate } = useApi<Me>('/api/me')
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!me) return <Loading what="your boats" />
  if (me.ownVessels.length === 0) return <Empty title="No boat is yours here yet" />
  return (
    <div className="pt-6">
      <p className="mb-6 max-w-[44em] text-finding tracking-[-0.015em]">
        Say when somebody sleeps aboard: a run wakes only people who are there, and nobody is warned of an
        empty boat’s night.
      </p>
      {me.ownVessels.map((vessel) => (
        <AboardCalendar key={vessel.id} vesselId={vessel.id} name={vessel.name} />
      ))}
      <Section
        title="Lay up"
        about="Nothing is sent and nothing is counted while a boat is laid up; the record goes on if the logger does."
      >
        <LayUpForm vessels={me.ownVessels} />
      </Section>
    </div>
  )
}
