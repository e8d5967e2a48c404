import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { AccountFrame } from '@/components/account/account-frame'
import { AboardSheet } from '@/components/account/aboard-sheet'

export const metadata: Metadata = { title: 'Aboard and lay-up' }

export default async function AboardPage() {
  await signedInAt('/account/aboard')
  return (
    <AccountFrame>
      <AboardSheet />
    </AccountFrame>
  )
}
