import { redirect } from 'next/navigation'

type Search = Promise<{ code?: string | string[] }>

/** The address that loggers made known before: goes to where codes are taken. */
export default async function LoggersClaimPage({ searchParams }: { searchParams: Search }) {
  const { code } = await searchParams
  redirect(typeof code === 'string' ? `/claim?code=${encodeURIComponent(code)}` : '/claim')
}
