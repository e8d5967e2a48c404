import type { OutlookScore } from '@/shared/schemas'

const count = (n: number, one: string, many: string): string => `${n} ${n === 1 ? one : many}`

/**
 * "Outlook, last 30 nights: of 412 nights 38 were foretold and ran, 9 foretold and quiet, 12 ran unforetold, 353
 * quiet. Brier score 0.05 against 0.11 for the base rate." Empty before the first scored night.
 */
export function outlookScoreWords({ nights, outcomes, brier, baseRateBrier }: OutlookScore): string {
  if (nights === 0) return ''
  const { hit, missed, quiet } = outcomes
  const tally = `Outlook, last 30 nights: of ${count(nights, 'night', 'nights')} ${hit} foretold and ran, ${outcomes.false} foretold and stayed quiet, ${missed} ran unforetold, ${quiet} quiet as foretold.`
  if (brier === null || baseRateBrier === null) return tally
  return `${tally} Brier score ${brier.toFixed(3)} against ${baseRateBrier.toFixed(3)} for the base rate (lower is better).`
}
