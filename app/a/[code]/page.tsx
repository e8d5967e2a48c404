import type { Metadata } from 'next'
import { LinkSheet } from '@/components/notices/link-sheet'
import { TitleBlock } from '@/components/ui/title-block'

// The address is a secret of the message's receiver: it goes into no referrer and no index.
export const metadata: Metadata = { title: 'From your message', referrer: 'no-referrer', robots: 'noindex' }

export default async function LinkPage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params
  return (
    <>
      <TitleBlock title="From your message" datum="Nothing happens before you choose." />
      <LinkSheet code={code} />
    </>
  )
}
