import { expect, test } from 'vitest'
import { compareBeforeAfter, type RepairVerdict } from '@/lib/analysis/comparison'
import { type Random, seededRandom } from '@/lib/analysis/statistics'
import { drawPeriod, type RepairStory } from './repairs'

const STORIES: RepairStory[] = ['full', 'partial', 'none', 'worse', 'pumped-out']
const EACH = 60
const LIMIT_HOURS = 3

const between = (random: Random, low: number, high: number) => low + random() * (high - low)
const logBetween = (random: Random, low: number, high: number) => low * Math.pow(high / low, random())

/** A leaking boat before a visit, what became of it, and the verdicts that are right. */
function drawStory(random: Random, story: RepairStory, daysAfter: number) {
  const before = story === 'worse' ? logBetween(random, 1, 8) : logBetween(random, 0.3, 2)
  const volume = story === 'pumped-out' ? between(random, 1.5, 2.5) : 1
  const after = {
    full: logBetween(random, 4.5, 20),
    partial: Math.min(2.5, before * between(random, 1.5, 2.5)),
    none: before,
    worse: before * between(random, 0.3, 0.65),
    'pumped-out': before,
  }[story]
  const right: Record<RepairStory, RepairVerdict> = {
    full: 'held',
    partial: after / before > 1.3 ? 'better-under-limit' : 'no-change',
    none: 'no-change',
    worse: 'worse',
    'pumped-out': 'no-change',
  }
  const habits = { flushesAnHour: between(random, 0.15, 0.8), swing: between(random, 0, 0.1) }
  const daysBefore = between(random, 4, 14)
  const from = 1_700_000_000_000
  const visit = from + daysBefore * 86_400_000
  return {
    right: right[story],
    before: drawPeriod(random, { ...habits, holdHours: before, volume: 1, days: daysBefore, from }),
    after: drawPeriod(random, { ...habits, holdHours: after, volume, days: daysAfter, from: visit }),
  }
}

test.each([
  { daysAfter: 3, least: 0.95 },
  { daysAfter: 1, least: 0.9 },
])('verdicts on simulated repairs, $daysAfter days after', ({ daysAfter, least }) => {
  const random = seededRandom(20_263)
  let right = 0
  let wrong = 0
  const lines = STORIES.map((story) => {
    const said: Partial<Record<RepairVerdict, number>> = {}
    for (let index = 0; index < EACH; index += 1) {
      const drawn = drawStory(random, story, daysAfter)
      const { verdict } = compareBeforeAfter(drawn.before, drawn.after, { limitSeconds: LIMIT_HOURS * 3600 })
      said[verdict] = (said[verdict] ?? 0) + 1
      if (verdict === drawn.right) right += 1
      else if (verdict !== 'too-early') wrong += 1
    }
    return `${story}: ${JSON.stringify(said)}`
  })
  const all = EACH * STORIES.length
  console.log(
    `${daysAfter} days after: right ${((100 * right) / all).toFixed(1)} %, wrong ${((100 * wrong) / all).toFixed(1)} %\n${lines.join('\n')}`,
  )
  expect(right / all).toBeGreaterThanOrEqual(least)
  expect(wrong / all).toBeLessThanOrEqual(0.05)
})
