import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { SetUpTab } from '@/components/vessel/set-up/set-up-tab'

export const metadata: Metadata = { title: 'Set-up' }

export default async function VesselSetUpPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await signedInAt(`/vessels/${encodeURIComponent(id)}/set-up`)
  return <SetUpTab id={id} />
}
