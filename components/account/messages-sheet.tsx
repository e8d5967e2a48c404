'use client'

import { AddContact } from '@/components/account/add-contact'
import { ContactSection } from '@/components/account/contact-section'
import { useApi } from '@/components/data/use-api'
import { Section } from '@/components/joining/section'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import type { Contact, List, Me } from '@/shared/schemas'

/** Where one is told things, what and when. */
export function MessagesSheet() {
  const { data: me } = useApi<Me>('/api/me')
  const { data, error, mutate } = useApi<List<Contact>>('/api/me/contacts')
  if (error) return <Trouble title={error.message} retry={() => void mutate()} />
  if (!data || !me) return <Loading what="your addresses" />
  const changed = () => void mutate()
  return (
    <div className="pt-6">
      <p className="mb-6 max-w-[44em] text-finding tracking-[-0.015em]">{finding(data.items)}</p>
      {data.items.map((contact) => (
        <ContactSection
          key={contact.id}
          contact={contact}
          isOwner={me.ownVessels.length > 0}
          isShop={me.shops.length > 0}
          isAccount={
            contact.channel === 'email' && contact.address.toLowerCase() === me.person.email.toLowerCase()
          }
          changed={changed}
        />
      ))}
      <Section
        title="A further address"
        about="A number is proven by six digits sent to it, a mailbox by a link. Nothing else is sent before."
      >
        <AddContact changed={changed} />
      </Section>
    </div>
  )
}

function finding(contacts: readonly Contact[]): string {
  const used = contacts.filter((contact) => contact.verifiedAt !== null && contact.stoppedAt === null)
  const [mail, text] = (['email', 'sms'] as const).map((channel) =>
    used.filter((contact) => contact.channel === channel),
  )
  if (used.length === 0)
    return contacts.some((contact) => contact.channel === 'email')
      ? 'You are told nothing at present.'
      : 'You are told by the e-mail of your account.'
  const ways = [
    ...(mail && mail.length > 0 ? ['by e-mail'] : []),
    ...(text && text.length > 0
      ? [`by text to ${text.map((contact) => contact.address).join(' and ')}`]
      : []),
  ]
  return `You are told ${ways.join(' and ')}.`
}
