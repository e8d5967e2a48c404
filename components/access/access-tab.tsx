'use client'

import { useSWRConfig } from 'swr'
import { LetIn } from '@/components/access/let-in'
import { ShopSight } from '@/components/access/shop-sight'
import { accessFinding } from '@/components/access/words'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { InviteOwner } from '@/components/access/invite-owner'
import { LogList } from '@/components/joining/log-list'
import { Section } from '@/components/joining/section'
import { dayOf } from '@/components/time'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { useVessel } from '@/components/vessel/use-vessel'
import type { VesselAccess } from '@/shared/schemas'

const LEVELS = { figures: 'leak figures', full: 'full record' }

/** Who can see this boat, how much and since when; the owner gives, changes and withdraws it here. */
export function AccessTab({ id }: { id: string }) {
  const now = useNow(60_000)
  const { mutate: mutateAll } = useSWRConfig()
  const { vessel } = useVessel(id)
  const mayGive = vessel?.rights.giveAccess ?? false
  const { data: access, error, mutate } = useApi<VesselAccess>(mayGive ? `/api/vessels/${id}/access` : null)
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (vessel && !mayGive) return <Empty title="Who may see this boat is its owner’s to say" />
  if (!vessel || !access) return <Loading what="who can see this boat" />
  const changed = () => {
    void mutateAll((key) => typeof key === 'string' && key.startsWith(`/api/vessels/${id}`))
  }
  const offset = vessel.utcOffsetSeconds
  return (
    <div className="pt-6">
      <p className="mb-6 max-w-[44em] text-finding tracking-[-0.015em]">{accessFinding(access)}</p>
      {access.shops.map((shop) => (
        <ShopSight
          key={`${shop.shopId} ${shop.level}`}
          vesselId={id}
          shop={shop}
          since={dayOf(shop.since, offset, now)}
          changed={changed}
        />
      ))}
      <Section
        title="Let a shop in"
        about="It sees the leak figures; during a visit also the full record, unless you leave that on."
      >
        <LetIn vesselId={id} inside={access.shops.map((shop) => shop.shopId)} changed={changed} />
      </Section>
      <Section title="Owners" about="Owners see everything and decide who else does.">
        <ul className="mb-5">
          {access.owners.map((owner) => (
            <li key={owner.personId} className="border-b border-line py-2 first:pt-0">
              <b className="font-semibold">{owner.name}</b>{' '}
              <span className="datum">since {dayOf(owner.since, offset, now)}</span>
            </li>
          ))}
        </ul>
        <InviteOwner vesselId={id} />
      </Section>
      {access.ended.length > 0 ? (
        <Section title="Before" about="Shops keep the visits they did; nothing else.">
          <table className="ruled">
            <thead>
              <tr>
                <th scope="col">Shop</th>
                <th scope="col">Saw</th>
                <th scope="col">From</th>
                <th scope="col">Until</th>
              </tr>
            </thead>
            <tbody>
              {access.ended.map((row) => (
                <tr key={`${row.shopName} ${row.from}`}>
                  <th scope="row">{row.shopName}</th>
                  <td>{LEVELS[row.level]}</td>
                  <td>{dayOf(row.from, offset, now)}</td>
                  <td>{dayOf(row.until, offset, now)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </Section>
      ) : null}
      <Section title="Who saw and changed what" about="Newest first, times as on board.">
        <LogList path={`/api/vessels/${id}/log`} offsetSeconds={offset} />
      </Section>
    </div>
  )
}
