'use client'

import { useState } from 'react'
import { Section } from '@/components/joining/section'
import { Choice } from '@/components/joining/choice'
import { ApiProblem, send } from '@/components/data/request'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { AccessLevel, VesselAccess } from '@/shared/schemas'

type Shop = VesselAccess['shops'][number]

/** What one shop may see: changed at a touch, withdrawn at once, asked twice. */
export function ShopSight({
  vesselId,
  shop,
  since,
  changed,
}: {
  vesselId: string
  shop: Shop
  since: string
  changed: () => void
}) {
  const [state, setState] = useState<'still' | 'busy' | 'asking'>('still')
  const [trouble, setTrouble] = useState<string | null>(null)
  const path = `/api/vessels/${vesselId}/access/${shop.shopId}`
  const act = async (work: () => Promise<unknown>) => {
    setState('busy')
    setTrouble(null)
    try {
      await work()
      changed()
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    }
    setState('still')
  }
  const choose = (level: AccessLevel) => void act(() => send('PUT', path, { level }))
  return (
    <Section title={shop.shopName} about={`May see the boat since ${since}.`}>
      <fieldset disabled={state === 'busy'} className="grid max-w-[34em] gap-2">
        <legend className="sr-only">What {shop.shopName} may see</legend>
        <Choice
          name={`level-${shop.shopId}`}
          checked={shop.level === 'figures'}
          onChange={() => choose('figures')}
          label="Leak figures"
          hint="State, hold time, runs by leak, trend and notices. During a visit also the full record."
        />
        <Choice
          name={`level-${shop.shopId}`}
          checked={shop.level === 'full'}
          onChange={() => choose('full')}
          label="The full record"
          hint="Also the vacuum minute by minute, flushes, and whether anybody is aboard."
        />
      </fieldset>
      {shop.level === 'figures' && shop.openVisits.length > 0 ? (
        <p className="mt-3 max-w-[34em] border-l-2 border-ink pl-3">
          A visit is{' '}
          {shop.openVisits.some((visit) => visit.status === 'under-way') ? 'under way' : 'being proved'}:
          until it is closed the shop sees the full record.
        </p>
      ) : null}
      <p className="datum mt-3 max-w-[34em]">
        {shop.people.length === 0
          ? 'Nobody is in this shop at present.'
          : `Its people: ${shop.people.map((person) => `${person.name} (${person.roles.join(', ')})`).join('; ')}.`}
      </p>
      {trouble ? <Trouble title={trouble} /> : null}
      <div className="mt-3 flex flex-wrap items-center gap-3">
        {state === 'asking' ? (
          <>
            <span>
              {shop.shopName} sees nothing of the boat any more, at once. It keeps the visits it did, and can
              send no warnings.
            </span>
            <Button onClick={() => void act(() => send('DELETE', path))}>Yes, withdraw</Button>
            <Button weight="quiet" onClick={() => setState('still')}>
              Keep it
            </Button>
          </>
        ) : (
          <Button weight="quiet" disabled={state === 'busy'} onClick={() => setState('asking')}>
            Withdraw the sight of {shop.shopName}
          </Button>
        )}
      </div>
    </Section>
  )
}
