import { LinkButton } from '@/components/ui/button'
import { TitleBlock } from '@/components/ui/title-block'

export default function NotFound() {
  return (
    <>
      <TitleBlock title="No such sheet" datum="What one may not see is not here either." />
      <div className="sheet grid max-w-[44em] justify-items-start gap-4">
        <p>
          The address may be mistyped, the boat may have left the shop’s care, or it is not yours to see. If a
          link in a message brought you here, sign in as the person it was sent to.
        </p>
        <LinkButton href="/">To the first page</LinkButton>
      </div>
    </>
  )
}
