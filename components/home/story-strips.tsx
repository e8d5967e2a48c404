import { NightAxis } from '@/components/charts/night-axis'
import { NightStrip } from '@/components/charts/night-strip'
import { storyNights } from '@/components/home/story'

/** A month of one boat's nights: the leak is there to be seen weeks before anyone is woken by it. */
export function StoryStrips() {
  return (
    <figure>
      <div className="grid grid-cols-[auto_1fr] items-center gap-x-3 gap-y-[5px] sm:gap-x-4">
        {storyNights().map(({ label, night, repaired }) => (
          <div key={label} className="contents">
            <span className={`figure ${repaired ? 'font-semibold text-sound' : 'text-ink-2'}`}>{label}</span>
            <NightStrip night={night} label={label} bold />
          </div>
        ))}
        <span />
        <NightAxis minutes={[0, 240, 480, 780, 960]} />
      </div>
      <figcaption className="datum mt-2 max-w-[60em]">
        Nine nights of an invented boat, six in the evening to ten in the morning, quiet hours dark. A full
        tick is the pump running by itself, a short one a flush. Hold time fell from 15 hours to 80 minutes in
        four weeks; a new bowl seal ended it.
      </figcaption>
    </figure>
  )
}
