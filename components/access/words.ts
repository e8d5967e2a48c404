import type { VesselAccess } from '@/shared/schemas'

type Shop = VesselAccess['shops'][number]

/** A shop with leak figures alone sees the full record as long as a visit is under way or being proved. */
export const seesFullRecord = (shop: Shop): boolean => shop.level === 'full' || shop.openVisits.length > 0

/** Who sees the boat, in a sentence. */
export function accessFinding(access: VesselAccess): string {
  const [first, ...others] = access.shops
  const owners = access.owners.length === 1 ? 'you' : `its ${access.owners.length} owners`
  if (first === undefined) return `Nobody but ${owners} can see this boat.`
  const sight = (shop: Shop): string =>
    `${shop.shopName} sees ${seesFullRecord(shop) ? 'the full record' : 'the leak figures'}`
  return `Besides ${owners}, ${[first, ...others].map(sight).join('; ')}.`
}
