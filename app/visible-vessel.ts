import { notFound } from 'next/navigation'
import { whoViews } from '@/lib/auth/page'
import { Problem } from '@/lib/problem'
import { getVessel } from '@/lib/vessels/get-vessel'

/** What one may not see does not exist: its pages answer 404, as its data does. Nobody signed in is the page's matter. */
export async function requireVisibleVessel(vesselId: string): Promise<void> {
  const who = await whoViews()
  if (who === null) return
  try {
    await getVessel(who.personId, vesselId, new Date())
  } catch (error) {
    if (error instanceof Problem && error.status === 404) notFound()
    throw error
  }
}
