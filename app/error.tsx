'use client'

import { Button } from '@/components/ui/button'
import { TitleBlock } from '@/components/ui/title-block'

export default function ErrorSheet({ retry }: { error: unknown; retry: () => void }) {
  return (
    <>
      <TitleBlock title="This sheet could not be drawn" datum="The boats are still being listened to." />
      <div className="sheet grid max-w-[44em] justify-items-start gap-4" role="alert">
        <p>
          Something went wrong here, not on the boat. Warnings go out as before. Try again; if it stays,
          reload the page.
        </p>
        <Button onClick={retry}>Try again</Button>
      </div>
    </>
  )
}
