import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { FleetSheet } from '@/components/fleet/fleet-sheet'

export const metadata: Metadata = { title: 'Fleet' }

export default async function FleetPage() {
  await signedInAt('/fleet')
  return <FleetSheet />
}
