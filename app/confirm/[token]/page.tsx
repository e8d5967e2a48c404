import type { Metadata } from 'next'
import { ConfirmForm } from '@/components/joining/confirm-form'
import { DeadLink } from '@/components/joining/dead-link'
import { TitleBlock } from '@/components/ui/title-block'
import { lookAtConfirmation } from '@/lib/joining/confirm'

export const metadata: Metadata = { title: 'Confirm', referrer: 'no-referrer' }

export default async function ConfirmPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params
  const confirmation = await lookAtConfirmation(token, new Date())
  if (confirmation === null)
    return <DeadLink again="Ask for a new one where you asked for this." href="/sign-in" word="Sign in" />
  return (
    <>
      <TitleBlock title="Confirm the address" />
      <div className="sheet">
        <ConfirmForm token={token} confirmation={confirmation} />
      </div>
    </>
  )
}
