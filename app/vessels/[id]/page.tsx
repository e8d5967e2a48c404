import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { NowTab } from '@/components/vessel/now/now-tab'

export const metadata: Metadata = { title: 'Now' }

export default async function VesselNowPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await signedInAt(`/vessels/${encodeURIComponent(id)}`)
  return <NowTab id={id} />
}
