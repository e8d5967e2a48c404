import type { AboardWord } from '../figures/types'
import type { FlushEvent } from './habit'
import { eveningStart } from './local-time'
import type { OutlookInput } from './types'

/**
 * Who is aboard tonight: what the owner or the calendar says; else `aboard` after a flush since 17:00 by the
 * boat's clock, else `unknown`.
 */
export function aboardTonight(
  input: Pick<OutlookInput, 'said' | 'offsets' | 'night' | 'at'>,
  events: readonly FlushEvent[],
): AboardWord {
  if (input.said !== 'unknown') return input.said
  const since = eveningStart(input.offsets, input.night.from)
  return events.some((event) => event.at >= since && event.at <= input.at) ? 'aboard' : 'unknown'
}
