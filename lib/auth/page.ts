import { cookies } from 'next/headers'
import { redirect } from 'next/navigation'
import { sessionCookieName } from './cookie'
import { whoIs, type Who } from './who'

/** Who looks at this page, or null. */
export async function whoViews(): Promise<Who | null> {
  return whoIs((await cookies()).get(sessionCookieName())?.value)
}

/** Who looks at this page; nobody is sent to sign in and comes back to `path` afterwards. */
export async function requireViewer(path: string): Promise<Who> {
  const who = await whoViews()
  if (who === null) redirect(`/sign-in?callbackUrl=${encodeURIComponent(path)}`)
  return who
}
