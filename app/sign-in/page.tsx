import type { Metadata } from 'next'
import Link from 'next/link'
import { redirect } from 'next/navigation'
import { demoPassword, isDemo } from '@/app/mode'
import { viewer as currentViewer } from '@/app/viewer'
import { homeOf } from '@/components/shell/viewer'
import { DemoAccounts, type DemoAccount } from '@/components/sign-in/demo-accounts'
import { safeNext } from '@/components/sign-in/safe-next'
import { SignInForm } from '@/components/sign-in/sign-in-form'
import { TitleBlock } from '@/components/ui/title-block'

export const metadata: Metadata = { title: 'Sign in' }

const ACCOUNTS: DemoAccount[] = [
  { email: 'owner@saltern.example', who: 'Owner', sees: 'Tonight on their own boats' },
  { email: 'manager@saltern.example', who: 'Shop manager', sees: 'The whole fleet, worst first' },
  { email: 'technician@saltern.example', who: 'Technician', sees: 'The record before a visit' },
  { email: 'installer@saltern.example', who: 'Installer', sees: 'Boats and their loggers' },
]

type Search = Promise<{ callbackUrl?: string | string[] }>

export default async function SignInPage({ searchParams }: { searchParams: Search }) {
  const next = safeNext((await searchParams).callbackUrl)
  const viewer = await currentViewer()
  if (viewer) redirect(next ?? homeOf(viewer))
  const goTo = next ?? '/sign-in'
  return (
    <>
      <TitleBlock title="Sign in" datum="For owners of connected boats and for the shops that keep them." />
      <div className="sheet grid items-start gap-x-16 gap-y-10 lg:grid-cols-[minmax(0,28em)_minmax(0,1fr)]">
        <div>
          <SignInForm goTo={goTo} />
          <p className="mt-4 flex flex-wrap gap-x-6">
            <Link href="/forgot-password" className="inline-flex min-h-11 items-center">
              Forgot the password?
            </Link>
            <Link href="/sign-up" className="inline-flex min-h-11 items-center">
              No account yet? Sign up
            </Link>
          </p>
        </div>
        {isDemo() ? <DemoAccounts accounts={ACCOUNTS} password={demoPassword()} goTo={goTo} /> : null}
      </div>
    </>
  )
}
