import type { Metadata } from 'next'
import { DeadLink } from '@/components/joining/dead-link'
import { InvitationForm } from '@/components/joining/invitation-form'
import { TitleBlock } from '@/components/ui/title-block'
import { whoViews } from '@/lib/auth/page'
import { lookAtInvitation } from '@/lib/joining/accept'

export const metadata: Metadata = { title: 'Invitation', referrer: 'no-referrer' }

export default async function InvitationPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params
  const [invitation, who] = await Promise.all([lookAtInvitation(token, new Date()), whoViews()])
  if (invitation === null)
    return (
      <DeadLink
        again="Ask who invited you to send it again."
        href={who ? '/account' : '/sign-in'}
        word={who ? 'Go to the account' : 'Sign in'}
      />
    )
  const inviter = invitation.invitedBy ?? 'Somebody'
  return (
    <>
      <TitleBlock title="An invitation" datum={`For ${invitation.email}.`} />
      <div className="sheet">
        <p className="mb-5 max-w-[38em] text-finding tracking-[-0.015em]">
          {invitation.vesselName === null
            ? `${inviter} invites you to ${invitation.shopName} as ${invitation.role}.`
            : `${inviter}${invitation.keptBy === null ? '' : ` of ${invitation.keptBy}`} invites you to be an owner of ${invitation.vesselName}.`}
        </p>
        <InvitationForm token={token} invitation={invitation} signedInAs={who?.email ?? null} />
      </div>
    </>
  )
}
