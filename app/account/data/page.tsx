import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { AccountFrame } from '@/components/account/account-frame'
import { DataSheet } from '@/components/account/data-sheet'

export const metadata: Metadata = { title: 'Your data' }

export default async function DataPage() {
  await signedInAt('/account/data')
  return (
    <AccountFrame>
      <DataSheet />
    </AccountFrame>
  )
}
