import type { Metadata } from 'next'
import { isDemo } from '@/app/mode'
import { ForgotPasswordForm } from '@/components/joining/password-forms'
import { TitleBlock } from '@/components/ui/title-block'

export const metadata: Metadata = { title: 'Forgot the password' }

export default function ForgotPasswordPage() {
  return (
    <>
      <TitleBlock
        title="Forgot the password"
        datum="A link to choose a new one comes by mail, good for an hour."
      />
      <div className="sheet">
        <ForgotPasswordForm demo={isDemo()} />
      </div>
    </>
  )
}
