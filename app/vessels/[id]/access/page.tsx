import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { AccessTab } from '@/components/access/access-tab'

export const metadata: Metadata = { title: 'Access' }

export default async function VesselAccessPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await signedInAt(`/vessels/${encodeURIComponent(id)}/access`)
  return <AccessTab id={id} />
}
