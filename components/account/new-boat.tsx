'use client'

import { useRouter } from 'next/navigation'
import { loadWhole } from '@/components/joining/load-whole'
import { NewBoatForm } from '@/components/register/new-boat-form'

/** A boat of one's own, with or without a shop; afterwards her logger is registered. */
export function NewBoat() {
  const router = useRouter()
  return (
    <NewBoatForm
      made={async () => {
        loadWhole('/tonight')
      }}
      cancel={() => router.back()}
      cancelWord="Back"
    />
  )
}
