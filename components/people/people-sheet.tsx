'use client'

import { useApi } from '@/components/data/use-api'
import { InviteForm } from '@/components/people/invite-form'
import { Member } from '@/components/people/member'
import { ShopChoice } from '@/components/people/shop-choice'
import { useManagedShop } from '@/components/people/use-managed-shop'
import { WaitingInvitations } from '@/components/people/waiting-invitations'
import { peopleFinding } from '@/components/people/words'
import { Section } from '@/components/joining/section'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { Invitation, List, ShopPerson } from '@/shared/schemas'

/** Who is in the shop, who is invited, and who may come. */
export function PeopleSheet() {
  const { me, error, shops, shop } = useManagedShop()
  const people = useApi<List<ShopPerson>>(shop ? `/api/shops/${shop.id}/people` : null)
  const waiting = useApi<List<Invitation>>(shop ? `/api/invitations?shop=${shop.id}` : null)
  const trouble = error ?? people.error ?? waiting.error
  return (
    <>
      <TitleBlock
        title="People"
        datum={shop ? `${shop.name}. What each may see follows with their next step.` : undefined}
      />
      <div className="sheet">
        {trouble ? <Trouble title={trouble.message} retry={() => void people.mutate()} /> : null}
        {me && !shop ? (
          <Empty title="You manage no shop">People and their roles are for a shop’s managers.</Empty>
        ) : null}
        {!trouble && (!me || (shop && !people.data)) ? <Loading what="the people" /> : null}
        {shop && me && people.data ? (
          <>
            <ShopChoice shops={shops} shopId={shop.id} path="/people" />
            <p className="mb-5 max-w-[44em] text-finding tracking-[-0.015em]">
              {peopleFinding(people.data.items.length, waiting.data?.items.length ?? 0)}
            </p>
            <ul className="border-t-[1.5px] border-ink">
              {people.data.items.map((person) => (
                <Member
                  // Roles set elsewhere start the line anew.
                  key={`${person.personId} ${person.roles.join()}`}
                  shopId={shop.id}
                  person={person}
                  isSelf={person.personId === me.person.id}
                  changed={() => void people.mutate()}
                />
              ))}
            </ul>
            <div className="mt-8">
              <Section title="Invitations that wait" about="A link works once, within 14 days of its mail.">
                <WaitingInvitations items={waiting.data?.items ?? []} changed={() => void waiting.mutate()} />
              </Section>
              <Section
                title="Invite somebody"
                about="They get a mail with a link. Whether they have an account already makes no difference."
              >
                <InviteForm shopId={shop.id} changed={() => void waiting.mutate()} />
              </Section>
            </div>
          </>
        ) : null}
      </div>
    </>
  )
}
