import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { VisitsTab } from '@/components/vessel/visits/visits-tab'

export const metadata: Metadata = { title: 'Visits' }

export default async function VesselVisitsPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await signedInAt(`/vessels/${encodeURIComponent(id)}/visits`)
  return <VisitsTab id={id} />
}
