'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { signIn } from 'next-auth/react'
import { useState } from 'react'
import { useForm } from 'react-hook-form'
import { z } from 'zod'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Trouble } from '@/components/ui/sheet-states'
// Sets zod to work without compiling functions, which the pages' security policy refuses.
import '@/shared/schemas/common'

const signInSchema = z.object({
  email: z.email('Write the address as in name@boat.example.'),
  password: z.string().min(1, 'Write your password.'),
  code: z.string().optional(),
})
type SignIn = z.infer<typeof signInSchema>

const REFUSED = 'That address and password do not go together.'
/** What the flow answers when the password is right and a code is wanted. */
export const CODE_WANTED = 'SecondFactor'
const CODE_WRONG = 'That code does not fit, or was used already. Wait for the next one.'
const UNREACHED = 'No answer. Check the connection and try again; what you typed is kept.'

/** Tries the credentials; null when they were taken, `CODE_WANTED`, or what went wrong. */
export async function trySignIn(credentials: SignIn): Promise<string | null> {
  try {
    const result = await signIn('credentials', { ...credentials, redirect: false })
    if (result?.ok) return null
    if (result?.error === CODE_WANTED) return CODE_WANTED
    return result?.error === 'SecondFactorWrong' ? CODE_WRONG : REFUSED
  } catch {
    return UNREACHED
  }
}

/** Signs a person in; on a refusal everything typed stays where it is. `goTo` is loaded whole, as the new person. */
export function SignInForm({ goTo }: { goTo: string }) {
  const [trouble, setTrouble] = useState<string | null>(null)
  const [wantsCode, setWantsCode] = useState(false)
  const { register, handleSubmit, formState } = useForm<SignIn>({
    resolver: zodResolver(signInSchema),
    defaultValues: { email: '', password: '', code: '' },
  })
  const submit = handleSubmit(async (credentials) => {
    setTrouble(null)
    const refused = await trySignIn(credentials)
    if (refused === null) window.location.assign(goTo)
    else if (refused === CODE_WANTED) setWantsCode(true)
    else setTrouble(refused)
  })
  return (
    <form
      method="post"
      onSubmit={(event) => void submit(event)}
      noValidate
      className="grid max-w-[26em] gap-4"
    >
      <Field
        label="E-mail"
        type="email"
        autoComplete="username"
        inputMode="email"
        error={formState.errors.email?.message}
        {...register('email')}
      />
      <Field
        label="Password"
        type="password"
        autoComplete="current-password"
        error={formState.errors.password?.message}
        {...register('password')}
      />
      {wantsCode ? (
        <Field
          label="Code"
          hint="Six digits from your device, or one of your recovery codes."
          autoComplete="one-time-code"
          autoFocus
          spellCheck={false}
          {...register('code')}
        />
      ) : null}
      {trouble ? <Trouble title={trouble} /> : null}
      <Button type="submit" disabled={formState.isSubmitting}>
        {formState.isSubmitting ? 'Signing in …' : 'Sign in'}
      </Button>
    </form>
  )
}
