'use client'

import { useApi } from '@/components/data/use-api'
import { VesselTonight } from '@/components/tonight/vessel-tonight'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import type { Me } from '@/shared/schemas'

/** The owner's home: every boat of theirs, tonight. */
export function TonightSheet() {
  const { data: me, error, mutate } = useApi<Me>('/api/me')
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!me) return <Loading what="your boats" />
  if (me.ownVessels.length === 0) {
    return (
      <Empty title="No boat is yours here yet">
        The shop that fitted your logger sends an invitation by e-mail. Open its link while you are signed in,
        and the boat stands here.
      </Empty>
    )
  }
  return (
    <div>
      {me.ownVessels.map((vessel) => (
        <VesselTonight key={vessel.id} id={vessel.id} name={vessel.name} />
      ))}
    </div>
  )
}
