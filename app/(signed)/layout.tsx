import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import type { ReactNode } from 'react'
import { viewer } from '@/app/viewer'

/** Everything in here is for people who are signed in; others are asked to, and come back to where they were. */
export default async function SignedLayout({ children }: { children: ReactNode }) {
  if (await viewer()) return children
  const path = (await headers()).get('x-path')
  redirect(path ? `/sign-in?callbackUrl=${encodeURIComponent(path)}` : '/sign-in')
}
