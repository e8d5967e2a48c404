import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { AccountFrame } from '@/components/account/account-frame'
import { SecuritySheet } from '@/components/account/security-sheet'

export const metadata: Metadata = { title: 'Signing in' }

export default async function SecurityPage() {
  await signedInAt('/account/security')
  return (
    <AccountFrame>
      <SecuritySheet />
    </AccountFrame>
  )
}
