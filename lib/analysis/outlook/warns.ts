import type { Outlook, WarningDecision, WarningReason, WarningSettings } from './types'

const STALE_MS = 2 * 3_600_000
const AGAIN_AFTER_MS = 7 * 86_400_000
const GROWN = 1.5

/**
 * Whether a night warning is due, with the reason that a person can read later. A warning needs the chance *if
 * flushed last thing* over the setting; where only the chance as it comes is, the Tonight screen says so and
 * nothing is sent. Never on data older than 2 hours, never when nobody is known to be aboard.
 */
export function warns(outlook: Outlook, settings: WarningSettings): WarningDecision {
  const no = (reason: WarningReason): WarningDecision => ({ warn: false, reason })
  const yes = (reason: WarningReason): WarningDecision => ({ warn: true, reason })
  const { chance, chanceIfFlushedLast, expectedRuns } = outlook
  if (!settings.expected) return no('not-expected')
  if (chance === null || chanceIfFlushedLast === null || expectedRuns === null) return no('learning')
  if (outlook.heardAt === null || outlook.at - outlook.heardAt > STALE_MS) return no('stale-data')
  if (outlook.at > settings.latestAt) return no('too-late')
  if (chanceIfFlushedLast <= settings.threshold) {
    return no(chance > settings.threshold ? 'flush-last-thing' : 'quiet-night')
  }
  if (outlook.aboard !== 'aboard') return no('nobody-aboard')
  const { lastWarning } = settings
  if (lastWarning === null) return yes('likely-even-if-flushed-last')
  if (expectedRuns >= GROWN * lastWarning.expectedRuns) return yes('grown-by-half')
  if (outlook.at - lastWarning.at >= AGAIN_AFTER_MS) return yes('seven-days-since')
  return no('already-said')
}
