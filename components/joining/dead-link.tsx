import { LinkButton } from '@/components/ui/button'
import { Empty } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'

/** A link that was used or has run out, and where to get a new one. */
export function DeadLink({ again, href, word }: { again: string; href: string; word: string }) {
  return (
    <>
      <TitleBlock title="This link leads nowhere" />
      <div className="sheet">
        <Empty title="It was used already, taken back, or has run out.">{again}</Empty>
        <LinkButton href={href}>{word}</LinkButton>
      </div>
    </>
  )
}
