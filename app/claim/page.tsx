import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { ClaimSheet } from '@/components/register/claim-sheet'

export const metadata: Metadata = { title: 'Claim a logger' }

type Search = Promise<{ code?: string | string[] }>

/** Where a logger sends whoever fits it (RFC 8628 3.3): with its code in the address, or to type it. */
export default async function ClaimPage({ searchParams }: { searchParams: Search }) {
  const { code } = await searchParams
  const given = typeof code === 'string' && code.trim() !== '' ? code.trim().slice(0, 20) : null
  await signedInAt(given === null ? '/claim' : `/claim?code=${encodeURIComponent(given)}`)
  return <ClaimSheet code={given} />
}
