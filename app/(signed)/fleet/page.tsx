import type { Metadata } from 'next'
import { FleetSheet } from '@/components/fleet/fleet-sheet'

export const metadata: Metadata = { title: 'Fleet' }

export default function FleetPage() {
  return <FleetSheet />
}
