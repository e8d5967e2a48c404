'use client'

import { useRouter } from 'next/navigation'
import { NewBoatForm } from '@/components/register/new-boat-form'

const HOME = '/tonight'

/** A boat of one's own, with or without a shop; afterwards her logger is registered. */
export function NewBoat() {
  const router = useRouter()
  return (
    <NewBoatForm
      made={async () => {
        // Loaded whole: the navigation of an owner is drawn by the server.
        window.location.assign(HOME)
      }}
      cancel={() => router.back()}
      cancelWord="Back"
    />
  )
}
