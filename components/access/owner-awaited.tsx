'use client'

import { InviteOwner } from '@/components/access/invite-owner'
import type { Vessel } from '@/shared/schemas'

/** A boat that the shop keeps waits for its owner: who may, invites them here. */
export function OwnerAwaited({ vessel }: { vessel: Vessel }) {
  if (vessel.keptBy === null || vessel.owner !== null || !vessel.rights.registerLogger) return null
  return (
    <section aria-labelledby="owner-awaited">
      <h2 id="owner-awaited">Hand over to the owner</h2>
      <p className="mt-1 mb-4 max-w-[38em] text-ink-2">
        {vessel.keptBy.name} keeps this boat until its owner accepts. From then on the owner says what the
        shop may see.
      </p>
      <InviteOwner vesselId={vessel.id} />
    </section>
  )
}
