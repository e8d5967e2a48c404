import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { NoticesTab } from '@/components/vessel/notices/notices-tab'

export const metadata: Metadata = { title: 'Notices' }

export default async function VesselNoticesPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await signedInAt(`/vessels/${encodeURIComponent(id)}/notices`)
  return <NoticesTab id={id} />
}
