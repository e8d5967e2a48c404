'use client'

import { useApi } from '@/components/data/use-api'
import { LogList } from '@/components/joining/log-list'
import { Section } from '@/components/joining/section'
import { ShopChoice } from '@/components/people/shop-choice'
import { useManagedShop } from '@/components/people/use-managed-shop'
import { ShopIdentityForm } from '@/components/shop/shop-identity-form'
import { ShopToldForm } from '@/components/shop/shop-told-form'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { List, ShopPerson, ShopWhole } from '@/shared/schemas'

/** What is kept of the shop, what it is told and when, and who did what. */
export function ShopSheet() {
  const { me, error, shops, shop: chosen } = useManagedShop()
  const {
    data: shop,
    error: shopError,
    mutate,
  } = useApi<ShopWhole>(chosen ? `/api/shops/${chosen.id}` : null)
  const people = useApi<List<ShopPerson>>(chosen ? `/api/shops/${chosen.id}/people` : null)
  const trouble = error ?? shopError ?? people.error
  return (
    <>
      <TitleBlock title="Shop" datum={shop ? `${shop.name}. Times in ${shop.timeZone}.` : undefined} />
      <div className="sheet">
        {trouble ? <Trouble title={trouble.message} retry={() => void mutate()} /> : null}
        {me && !chosen ? (
          <Empty title="You manage no shop">These pages are for a shop’s managers.</Empty>
        ) : null}
        {!trouble && (!me || (chosen && !(shop && people.data))) ? <Loading what="the shop" /> : null}
        {shop && people.data ? (
          <div key={shop.id}>
            <ShopChoice shops={shops} shopId={shop.id} path="/shop" />
            <p className="mb-6 max-w-[44em] text-finding tracking-[-0.015em]">{finding(shop)}</p>
            <Section title="Name and harbour" about="As owners see it when they choose whom to let in.">
              <ShopIdentityForm shop={shop} changed={() => void mutate()} />
            </Section>
            <Section
              title="What the shop is told"
              about="Managers get these by mail; each chooses under Account what comes by text. Owners choose for themselves."
            >
              <ShopToldForm shop={shop} people={people.data.items} changed={() => void mutate()} />
            </Section>
            <Section
              title="Who did what"
              about="Roles, invitations, keys and set-up, newest first. Times in UTC."
            >
              <LogList path={`/api/shops/${shop.id}/log`} offsetSeconds={0} showVessel />
            </Section>
          </div>
        ) : null}
      </div>
    </>
  )
}

function finding(shop: ShopWhole): string {
  const quiet = `Messages that can wait do so from ${shop.quietHours.start} to ${shop.quietHours.end}`
  return shop.onCall === null
    ? `${quiet}; urgent ones that nobody takes up go on to every manager.`
    : `${quiet}; urgent ones that nobody takes up go on to ${shop.onCall.name}.`
}
