import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { AccountFrame } from '@/components/account/account-frame'
import { YouSheet } from '@/components/account/you-sheet'

export const metadata: Metadata = { title: 'Account' }

export default async function AccountPage() {
  await signedInAt('/account')
  return (
    <AccountFrame>
      <YouSheet />
    </AccountFrame>
  )
}
