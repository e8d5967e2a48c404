import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { RecordTab } from '@/components/vessel/record/record-tab'

export const metadata: Metadata = { title: 'Record' }

export default async function VesselRecordPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await signedInAt(`/vessels/${encodeURIComponent(id)}/record`)
  return <RecordTab id={id} />
}
