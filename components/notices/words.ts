import type { NoticeKind } from '@/shared/schemas'

/** The name of each kind of notice, as it heads a row. */
export const NOTICE_WORDS: Record<NoticeKind, string> = {
  'night-warning': 'Night warning',
  'short-hold': 'Short hold',
  'short-cycling': 'Short cycling',
  'running-on': 'Running on',
  'no-start': 'No start',
  'slow-recharge': 'Slow recharge',
  'switch-drift': 'Switch drift',
  step: 'Step in the leak',
  'logger-silent': 'Logger silent',
  'sensor-fault': 'Sensor fault',
  'low-supply': 'Low supply',
  freeze: 'Freeze',
}

/** What each kind means, for the person who reads it first. */
export const NOTICE_MEANINGS: Record<NoticeKind, string> = {
  'night-warning': 'the pump is likely to run in the coming night',
  'short-hold': 'the system holds less than its limit',
  'short-cycling': 'the pump runs by itself every few minutes',
  'running-on': 'the pump stays on and the vacuum does not rise',
  'no-start': 'somebody flushed, there is no vacuum, and the pump did not start',
  'slow-recharge': 'the pump needs much longer than usual to draw down',
  'switch-drift': 'the vacuum switch stops or starts the pump elsewhere than it did',
  step: 'the leak changed at once, not slowly',
  'logger-silent': 'nothing has come from the logger for longer than usual',
  'sensor-fault': 'a sensor reads what cannot be',
  'low-supply': 'the supply voltage is under the set figure',
  freeze: 'it is close to freezing by the pump, and the system is not laid up',
}

/** Kinds whose notice is about people being woken or a pump in trouble now: these alone wear the hot colour. */
export const isHot = (kind: NoticeKind): boolean =>
  ['night-warning', 'short-hold', 'short-cycling', 'running-on', 'no-start', 'step'].includes(kind)
