import { headers } from 'next/headers'
import { notFound } from 'next/navigation'
import { cache } from 'react'
import { requireViewer, whoViews } from '@/lib/auth/page'
import { Problem } from '@/lib/problem'
import { getVessel } from '@/lib/vessels/get-vessel'
import { idSchema, type Vessel } from '@/shared/schemas'

/** The vessel as this reader may see it, once a request; null when nobody is signed in or there is none to see. */
const visibleVessel = cache(
  async (vesselId: string): Promise<{ vessel: Vessel | null; signedIn: boolean }> => {
    const who = await whoViews()
    if (who === null) return { vessel: null, signedIn: false }
    // An id that could never be one is as absent as a boat of somebody else.
    if (!idSchema.safeParse(vesselId).success) return { vessel: null, signedIn: true }
    try {
      return { vessel: await getVessel(who.personId, vesselId, new Date()), signedIn: true }
    } catch (error) {
      if (error instanceof Problem && error.status >= 400 && error.status < 500)
        return { vessel: null, signedIn: true }
      throw error
    }
  },
)

/**
 * What one may not see does not exist: its pages answer 404, as its data does. Nobody is sent to sign in from here
 * already: once a layout is on its way, a page's own sending comes too late to be the answer's status.
 */
export async function requireVisibleVessel(vesselId: string): Promise<void> {
  const { vessel, signedIn } = await visibleVessel(vesselId)
  if (!signedIn) await requireViewer((await headers()).get('x-path') ?? '/')
  if (vessel === null) notFound()
}

/** The boat's name for the window's title; the plain word where there is nothing to see. */
export const vesselTitle = async (vesselId: string): Promise<string> =>
  (await visibleVessel(vesselId)).vessel?.name ?? 'Vessel'
