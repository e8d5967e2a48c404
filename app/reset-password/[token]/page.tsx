import type { Metadata } from 'next'
import { DeadLink } from '@/components/joining/dead-link'
import { ResetPasswordForm } from '@/components/joining/password-forms'
import { TitleBlock } from '@/components/ui/title-block'
import { resetLinkWorks } from '@/lib/joining/reset-password'

export const metadata: Metadata = { title: 'New password', referrer: 'no-referrer' }

export default async function ResetPasswordPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params
  if (!(await resetLinkWorks(token, new Date())))
    return <DeadLink again="Have a new one sent." href="/forgot-password" word="Send me a new link" />
  return (
    <>
      <TitleBlock title="Choose a new password" datum="Every device will be signed out." />
      <div className="sheet">
        <ResetPasswordForm token={token} />
      </div>
    </>
  )
}
