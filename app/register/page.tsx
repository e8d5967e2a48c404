import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { RegisterSheet } from '@/components/register/register-sheet'

export const metadata: Metadata = { title: 'Register a logger' }

type Search = Promise<Record<string, string | string[] | undefined>>

export default async function RegisterPage({ searchParams }: { searchParams: Search }) {
  await signedInAt('/register')
  const { serial, system, known } = await searchParams
  const word = (value: string | string[] | undefined) => (typeof value === 'string' ? value : undefined)
  return (
    <RegisterSheet
      beforehand={{ serial: word(serial), systemId: word(system), known: word(known) !== undefined }}
    />
  )
}
