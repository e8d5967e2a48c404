import type { Metadata } from 'next'
import Link from 'next/link'
import { redirect } from 'next/navigation'
import { isDemo } from '@/app/mode'
import { viewer as currentViewer } from '@/app/viewer'
import { SignUpForm } from '@/components/joining/sign-up-form'
import { TitleBlock } from '@/components/ui/title-block'

export const metadata: Metadata = { title: 'Sign up' }

export default async function SignUpPage() {
  if (await currentViewer()) redirect('/account')
  return (
    <>
      <TitleBlock title="Sign up" datum="An account for an owner, or for a shop and its people." />
      <div className="sheet">
        <SignUpForm demo={isDemo()} />
        <p className="mt-6">
          Have an account already? <Link href="/sign-in">Sign in</Link>
        </p>
      </div>
    </>
  )
}
