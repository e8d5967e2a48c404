import { type Role, type Viewer } from '@/components/shell/viewer'
import { requireViewer, whoViews } from '@/lib/auth/page'

type Who = Awaited<ReturnType<typeof requireViewer>>

function asViewer(who: Who): Viewer {
  const roles: Role[] = [...new Set(who.memberships.map((membership) => membership.role))]
  return { name: who.name, roles: who.ownsVessels ? ['owner', ...roles] : roles }
}

/** Who reads this page, or null. */
export async function viewer(): Promise<Viewer | null> {
  const who = await whoViews()
  return who && asViewer(who)
}

/** Who reads this page; nobody is sent to sign in, and comes back to `path`. */
export const signedInAt = async (path: string): Promise<Viewer> => asViewer(await requireViewer(path))
