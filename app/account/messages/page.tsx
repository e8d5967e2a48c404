import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { AccountFrame } from '@/components/account/account-frame'
import { MessagesSheet } from '@/components/account/messages-sheet'

export const metadata: Metadata = { title: 'Messages to you' }

export default async function MessagesPage() {
  await signedInAt('/account/messages')
  return (
    <AccountFrame>
      <MessagesSheet />
    </AccountFrame>
  )
}
