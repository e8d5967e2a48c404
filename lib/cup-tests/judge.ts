import { cupTest } from '@/lib/analysis/signatures'
import type { CupVerdict } from '@/shared/schemas'
import type { CupRate } from './rates'

/** What the leak did, and how long the water has been in. */
export interface CupFacts {
  headName: string
  before: CupRate | null
  wet: CupRate | null
  after: CupRate | null
  wetMinutes: number
  /** Since the flush that took the water; 0 before it. */
  afterMinutes: number
  over: boolean
}

export interface CupJudgement {
  /** Null = not yet: waiting longer helps. */
  verdict: CupVerdict | null
  sentence: string
  /** About how many more minutes nothing should be flushed; null when that would not help or is not needed. */
  minutesLeft: number | null
}

/** Half an hour with the water in: looked at sooner and again and again, chance alone would convict a bowl. */
const LEAST_MINUTES = 30
/** Past this nobody waits without a flush. */
const MOST_MINUTES = 180
/** A bowl is cleared once twice the error of the difference is under 30 % of the leak (see `cupTest`). */
const CLEARING_SHARE = 0.15
const SURE = 2
const DRY_AGAIN_MINUTES = 90

/**
 * The verdict of a cup test, in words for the one who did it; the deciding itself is `cupTest`'s.
 * @example judge({ headName: 'Forward head', before, wet, after: null, wetMinutes: 45, over: false }).verdict // 'seal'
 */
export function judge(facts: CupFacts): CupJudgement {
  const { headName, before, wet, after, wetMinutes, over } = facts
  const ready = over || wetMinutes >= LEAST_MINUTES
  const judged =
    before === null || wet === null || !ready ? null : strengthOf({ headName, before, wet, after })
  if (before !== null && wet !== null && judged !== null) {
    if (judged < 1)
      return decided(
        'cleared',
        `The leak went on with water in ${headName}: its seal is cleared. ${next(over)}`,
      )
    const share = Math.round(100 * Math.min(1, (before.paPerHour - wet.paPerHour) / before.paPerHour))
    return decided(
      'seal',
      `It is the seal of ${headName}: water took ${share} % of the leak away${cameBack(facts)}`,
    )
  }
  const minutes = over ? null : minutesLeft(facts)
  if (minutes !== null) return { verdict: null, sentence: waiting(facts, minutes), minutesLeft: minutes }
  return decided('cannot-tell', `Cannot tell: ${whyNot(facts)}`)
}

const decided = (verdict: CupVerdict, sentence: string): CupJudgement => ({
  verdict,
  sentence,
  minutesLeft: null,
})

const next = (over: boolean): string => (over ? 'Try the next bowl.' : 'Flush it, and try the next bowl.')

/** The factor on a bowl's seal that the test gives; null when it says neither. */
export function strengthOf(test: {
  headName: string
  before: CupRate
  wet: CupRate
  after: CupRate | null
}): number | null {
  const finding = cupTest({ cupTests: [test] })
  return finding.enough ? (finding.suspects[0]?.strength ?? null) : null
}

function cameBack({ wet, after, over, afterMinutes }: CupFacts): string {
  if (!over) return '. Flush it once: if the leak comes back, that is certain.'
  if (wet === null || after === null) return '. What it did after the flush was not measured yet.'
  const back = after.paPerHour - wet.paPerHour > SURE * Math.hypot(after.sigma, wet.sigma)
  if (back) return ', and a flush brought it back.'
  // A flush wets the seal as well, for up to an hour.
  return afterMinutes < DRY_AGAIN_MINUTES
    ? '. Whether it comes back after the flush shows within an hour or two.'
    : '. The flush did not bring it back: wet that bowl once more to be certain.'
}

/**
 * How much longer it takes: a slope's error falls with the length of its line to the power of 1.5 (regular
 * readings). Null when no longer wait would tell.
 */
export function minutesLeft({ before, wet, wetMinutes }: CupFacts): number | null {
  const least = LEAST_MINUTES - wetMinutes
  if (wet === null) return wetMinutes > MOST_MINUTES ? null : Math.max(5, Math.ceil(least))
  if (before === null || before.paPerHour <= SURE * before.sigma) return least > 0 ? Math.ceil(least) : null
  const wanted = (CLEARING_SHARE * before.paPerHour) ** 2 - before.sigma ** 2
  // The rate before is too rough to clear a bowl by; a seal would show all the same.
  if (wanted <= 0) return least > 0 ? Math.ceil(least) : null
  const more = wetMinutes * ((wet.sigma / Math.sqrt(wanted)) ** (2 / 3) - 1)
  // Measured well enough, and neither gone nor unchanged: more of the same says no more.
  if (least <= 0 && more <= 0) return null
  const minutes = Math.ceil(Math.max(least, more, 5))
  return wetMinutes + minutes > MOST_MINUTES ? null : minutes
}

function waiting({ before, wet, wetMinutes }: CupFacts, minutes: number): string {
  const about = `about ${minutes} more ${minutes === 1 ? 'minute' : 'minutes'} without a flush`
  if (before === null)
    return `Not told yet: ${about}. The leak before the water was not measured, so this may not tell.`
  if (wet === null && wetMinutes >= LEAST_MINUTES)
    return `Not told yet: ${about}. No leak was measured since the water went in; readings may be late.`
  if (wet === null) return `Not told yet: ${about}.`
  const share = Math.max(0, Math.round((100 * wet.paPerHour) / before.paPerHour))
  return before.paPerHour > SURE * before.sigma
    ? `Not told yet: ${about}. So far the leak is ${share} % of what it was.`
    : `Not told yet: ${about}.`
}

function whyNot({ before, wet, over }: CupFacts): string {
  if (before === null)
    return 'the leak before the water was not measured. Flush nothing for half an hour first, then put the water in.'
  if (before.paPerHour <= SURE * before.sigma)
    return 'before the water went in there was hardly a leak to find. Try on an evening when it leaks.'
  if (wet === null)
    return over
      ? 'a flush came before the leak with water could be measured. Try again, half an hour without a flush.'
      : 'no leak was measured since the water went in. Look whether the logger is heard.'
  return 'the leak changed too little, or too unevenly, to be sure. Try again: nobody flushes for half an hour before the water and half an hour after.'
}
