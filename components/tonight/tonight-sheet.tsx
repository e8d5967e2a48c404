'use client'

import Link from 'next/link'
import { useApi } from '@/components/data/use-api'
import { VesselTonight } from '@/components/tonight/vessel-tonight'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { sortRows } from '@/components/fleet/order'
import type { FleetRow, List, Me } from '@/shared/schemas'

/** The boat that wants attention stands on top; until the states are read, by name. */
function worstFirst(vessels: Me['ownVessels'], rows: readonly FleetRow[]): Me['ownVessels'] {
  const order = sortRows(rows, 'worst').map((row) => row.vesselId)
  const place = (id: string) => (order.includes(id) ? order.indexOf(id) : order.length)
  return [...vessels].sort((a, b) => place(a.id) - place(b.id))
}

/** The owner's home: every boat of theirs, tonight. */
export function TonightSheet() {
  const { data: me, error, mutate } = useApi<Me>('/api/me')
  const rows = useApi<List<FleetRow>>(me && me.ownVessels.length > 1 ? '/api/vessels' : null).data?.items
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!me) return <Loading what="your boats" />
  if (me.ownVessels.length === 0) {
    return (
      <Empty title="No boat is yours here yet">
        The shop that fitted your logger sends an invitation by e-mail. Open its link while you are signed in,
        and the boat stands here. Or <Link href="/account/boat">set up a boat of your own</Link>, without a
        shop.
      </Empty>
    )
  }
  return (
    <div>
      {worstFirst(me.ownVessels, rows ?? []).map((vessel) => (
        <VesselTonight key={vessel.id} id={vessel.id} name={vessel.name} />
      ))}
    </div>
  )
}
