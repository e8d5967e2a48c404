import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { PumpTab } from '@/components/vessel/pump/pump-tab'

export const metadata: Metadata = { title: 'Pump' }

export default async function VesselPumpPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await signedInAt(`/vessels/${encodeURIComponent(id)}/pump`)
  return <PumpTab id={id} />
}
