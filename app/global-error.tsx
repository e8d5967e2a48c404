'use client'

import './globals.css'

/** Stands in for the whole page when even its frame could not be drawn. */
export default function GlobalError({ retry }: { error: unknown; retry: () => void }) {
  return (
    <html lang="en">
      <body>
        <title>Middlewatch could not be drawn</title>
        <main className="sheet grid max-w-[44em] justify-items-start gap-4 pt-16" role="alert">
          <h1>Middlewatch could not be drawn</h1>
          <p>Something went wrong here, not on the boat. Warnings go out as before.</p>
          <button
            type="button"
            className="min-h-11 rounded-sm bg-act px-4 font-semibold text-water"
            onClick={() => retry()}
          >
            Try again
          </button>
        </main>
      </body>
    </html>
  )
}
