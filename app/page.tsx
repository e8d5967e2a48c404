import { isDemo } from '@/app/mode'
import { viewer as currentViewer } from '@/app/viewer'
import { Places } from '@/components/home/places'
import { StoryStrips } from '@/components/home/story-strips'
import { homeOf } from '@/components/shell/viewer'
import { LinkButton } from '@/components/ui/button'

export default async function HomePage() {
  const viewer = await currentViewer()
  return (
    <div className="sheet pt-10 sm:pt-16">
      <h1 className="max-w-[17em] text-poster tracking-[-0.035em]">
        Nobody should hear of a leak from the pump, at three in the morning.
      </h1>
      <p className="mt-5 max-w-[38em] text-lead text-ink-2">
        A small logger listens to the vacuum pump behind a boat’s toilets. Middlewatch reads how fast the
        system leaks, warns the owner before the night, and leads the technician to the part that lets the air
        in.
      </p>
      <div className="mt-7 mb-9 flex flex-wrap gap-3">
        {viewer ? <LinkButton href={homeOf(viewer)}>Go to your boats</LinkButton> : null}
        {!viewer && isDemo() ? <LinkButton href="/sign-in#demo">Try the demo</LinkButton> : null}
        {!viewer && !isDemo() ? <LinkButton href="/sign-in">Sign in</LinkButton> : null}
        <LinkButton href="/calculators" weight="quiet">
          Work out a leak-down
        </LinkButton>
      </div>
      <StoryStrips />
      <Places />
    </div>
  )
}
