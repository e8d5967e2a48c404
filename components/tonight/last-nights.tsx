import { NightAxis, axisMinutes } from '@/components/charts/night-axis'
import { NightStrip } from '@/components/charts/night-strip'
import { inQuiet } from '@/components/charts/scales'
import { drawnOn, withSilence } from '@/components/nights'
import { dayOfDate, weekdayOfDate } from '@/components/time'
import type { Night } from '@/shared/schemas'

/** Runs by themselves within the quiet hours: what may have woken somebody. */
export const wokenBy = (night: Night): number =>
  drawnOn(night).runs.filter((minute) => inQuiet(minute, night.quiet)).length

/** What a night came to: "quiet", "1 run", "6 runs", "c. 75 runs" where not every one was listed. */
export function nightWord(night: Night & { unheardFrom?: number }): string {
  if (night.unheardFrom !== undefined) return 'unheard'
  const count = wokenBy(night)
  if (count === 0) return 'quiet'
  const about = night.more > 0 ? 'c. ' : ''
  return `${about}${count} ${count === 1 ? 'run' : 'runs'}`
}

/** Green for a quiet night, the hot colour for runs that matter, plain for what is not known. */
function wordTone(night: Night & { unheardFrom?: number }, calm: boolean): string {
  if (night.unheardFrom !== undefined) return 'text-ink-2'
  if (wokenBy(night) === 0) return 'text-sound'
  return calm ? '' : 'text-attention'
}

/** The last nights, newest first, each as a strip with its outcome in a word. */
export function LastNights({
  nights,
  calm,
  lastHeardAt,
  offsetSeconds,
}: {
  nights: readonly Night[]
  calm: boolean
  lastHeardAt: string | null
  offsetSeconds: number
}) {
  const newest = nights.map((night) => withSilence(night, lastHeardAt, offsetSeconds)).reverse()
  const quiet = newest[0]?.quiet ?? [240, 780]
  return (
    <div className="grid grid-cols-[2.4em_1fr_4.6em] items-center gap-x-3 gap-y-1.5">
      {newest.map((night) => (
        <div key={night.date} className="contents">
          <span>{weekdayOfDate(night.date)}</span>
          <NightStrip night={drawnOn(night)} height={20} calm={calm} label={dayOfDate(night.date)} />
          <span className={`figure ${wordTone(night, calm)}`}>{nightWord(night)}</span>
        </div>
      ))}
      <span />
      <NightAxis minutes={axisMinutes(quiet, 180)} />
      <span />
    </div>
  )
}
