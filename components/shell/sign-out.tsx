'use client'

import { signOut } from 'next-auth/react'

/** Ends the session and goes back to the first page. */
export function SignOut() {
  return (
    <button
      type="button"
      className="min-h-11 px-1 text-ink-2 hover:text-ink hover:underline"
      onClick={() => void signOut({ callbackUrl: '/' })}
    >
      Sign out
    </button>
  )
}
