import Link from 'next/link'

/** A mail is on its way; the same words whether anybody goes by the address or not. */
export function Sent({ to, what, demo }: { to: string; what: string; demo: boolean }) {
  return (
    <div role="status" className="max-w-[38em]">
      <p className="text-finding tracking-[-0.015em]">
        A mail is on its way to <span className="break-all">{to}</span>.
      </p>
      <p className="mt-2 text-ink-2">
        {what} Nothing came after a few minutes? Look among unwanted mail, check the address, then try again.
      </p>
      {demo ? (
        <p className="mt-3">
          This is the demo: the mail stands in the <Link href="/outbox">outbox</Link>.
        </p>
      ) : null}
    </div>
  )
}
