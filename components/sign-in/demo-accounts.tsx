'use client'

import { useState } from 'react'
import { trySignIn } from '@/components/sign-in/sign-in-form'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'

export type DemoAccount = { email: string; who: string; sees: string }

/** One press a role: each account of the demo, and what it shows. */
export function DemoAccounts({
  accounts,
  password,
  goTo,
}: {
  accounts: readonly DemoAccount[]
  password: string
  goTo: string
}) {
  const [busy, setBusy] = useState<string | null>(null)
  const [trouble, setTrouble] = useState<string | null>(null)
  const enter = async (email: string) => {
    setBusy(email)
    setTrouble(null)
    const refused = await trySignIn({ email, password })
    if (refused === null) window.location.assign(goTo)
    else {
      setTrouble(refused)
      setBusy(null)
    }
  }
  return (
    <section id="demo" aria-labelledby="demo-title" className="max-w-[34em]">
      <h2 id="demo-title">Try the demo</h2>
      <p className="mt-1 text-ink-2">
        An invented shop and its boats, heard live. Choose whose eyes to look through; the password of each is{' '}
        <span className="figure">{password}</span>.
      </p>
      <ul className="mt-4">
        {accounts.map((account) => (
          <li
            key={account.email}
            className="grid grid-cols-[1fr_auto] items-center gap-3 border-t border-line py-3 last:border-b"
          >
            <span>
              <b className="font-semibold">{account.who}</b>
              <span className="datum block">{account.sees}</span>
              <span className="datum block break-all">{account.email}</span>
            </span>
            <Button weight="quiet" disabled={busy !== null} onClick={() => void enter(account.email)}>
              {busy === account.email ? 'Entering …' : 'Enter'}
              <span className="sr-only">as {account.who}</span>
            </Button>
          </li>
        ))}
      </ul>
      {trouble ? <Trouble title={trouble} /> : null}
    </section>
  )
}
