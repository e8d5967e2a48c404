import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { NoticesSheet } from '@/components/notices/notices-sheet'

export const metadata: Metadata = { title: 'Notices' }

export default async function NoticesPage() {
  await signedInAt('/notices')
  return <NoticesSheet />
}
