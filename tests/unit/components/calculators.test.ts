import { describe, expect, it } from 'vitest'
import { alignmentOf, logTicks } from '@/components/calculators/alignment'
import { convertFields, exampleFields, numberOf, readingsOf } from '@/components/calculators/readings'
import { verdictBasis, verdictSentence, verdictState } from '@/components/calculators/verdict'
import { plain } from '@/components/tonight/phrases'
import { GAUGE_RESOLUTION_PA, judgeLeakDown } from '@/lib/analysis/leak-down'
import { DEFAULT_UNITS, inHgToPa } from '@/shared/units'

const D = inHgToPa(1.8)

describe('what is typed', () => {
  it('is read as people write numbers', () => {
    expect(numberOf(' 9,4 ')).toBe(9.4)
    expect(numberOf('−1.5')).toBe(-1.5)
    expect(numberOf('')).toBeNull()
    expect(numberOf('nine')).toBeNull()
  })
  it('keeps its meaning when the unit changes, and what is not a number as it stands', () => {
    const typed = { ...exampleFields(DEFAULT_UNITS), second: 'abc', airFirst: '20' }
    const kPa = { ...DEFAULT_UNITS, vacuum: 'kPa' as const, temperature: 'F' as const }
    const changed = convertFields(typed, DEFAULT_UNITS, kPa)
    expect(changed.first).toBe('33.525')
    expect(changed.second).toBe('abc')
    expect(changed.airFirst).toBe('68')
    expect(Number(convertFields(changed, kPa, DEFAULT_UNITS).first)).toBeCloseTo(9.9, 3)
  })
  it('is refused field by field, with what to write instead', () => {
    const fields = { ...exampleFields(DEFAULT_UNITS), first: '', minutes: '0', volume: 'big' }
    const { readings, troubles } = readingsOf(fields, DEFAULT_UNITS, GAUGE_RESOLUTION_PA)
    expect(readings).toBeNull()
    expect(Object.keys(troubles).sort()).toEqual(['first', 'minutes', 'volume'])
  })
})

describe('the verdict in words', () => {
  const judged = (change: Partial<ReturnType<typeof exampleFields>>) => {
    const { readings } = readingsOf(
      { ...exampleFields(DEFAULT_UNITS), ...change },
      DEFAULT_UNITS,
      GAUGE_RESOLUTION_PA,
    )
    if (readings === null) throw new Error('the example must be readable')
    return { readings, answer: judgeLeakDown(readings) }
  }
  it('gives hold time, interval and the least', () => {
    const { readings, answer } = judged({})
    expect(plain(verdictSentence(answer, readings))).toBe(
      'Leaking. It would hold about 1.8 h (1.6 to 2.1 h); the least is 3 h.',
    )
    expect(verdictState(answer.verdict)).toBe('leaking')
  })
  it('says how much longer to wait', () => {
    const { readings, answer } = judged({ second: '9.8', minutes: '10', gauge: 'dial' })
    expect(plain(verdictSentence(answer, readings))).toMatch(/^Cannot tell yet: \d+ more minutes decide it\./)
    expect(verdictState(answer.verdict)).toBe('learning')
  })
  it('says what cooling hid, the leak flow and the hole', () => {
    const { readings, answer } = judged({ airFirst: '20', airSecond: '18.5', volume: '38' })
    const words = verdictBasis(answer, readings, DEFAULT_UNITS)
    expect(words).toContain('Lost 0.50 inHg on the gauge. Weather and temperature hid 0.')
    expect(words).toMatch(/L of air an hour, as through a sharp hole 0\.\d+ mm wide/)
  })
  it('does not call a rising gauge a repair', () => {
    const { readings, answer } = judged({ second: '10.0' })
    expect(verdictBasis(answer, readings, DEFAULT_UNITS)).toContain('weather or temperature, not a repair')
  })
})

describe('the alignment chart', () => {
  const chart = alignmentOf(D, 'inHg')
  it('reads hold = differential × time / loss off a straight line, wherever it lies', () => {
    for (const minutes of [5, 17, 30, 60])
      for (const loss of [0.05, 0.3, 1.1, 3]) {
        const middle = (chart.yOfMinutes(minutes) + chart.yOfLoss(inHgToPa(loss))) / 2
        expect(middle).toBeCloseTo(chart.yOfHours((1.8 * minutes) / 60 / loss), 1)
      }
  })
  it('has the rule of thumb on it: 0.3 inHg in 30 minutes is 3 hours (common practice, no source)', () => {
    const middle = (chart.yOfMinutes(30) + chart.yOfLoss(inHgToPa(0.3))) / 2
    expect(middle).toBeCloseTo(chart.yOfHours(3), 1)
    expect(chart.hourTicks.find((tick) => tick.value === 3)?.label).toBe('3 h limit')
  })
  it('prints no label over another, in any unit', () => {
    for (const unit of ['inHg', 'kPa', 'mbar'] as const) {
      const ys = alignmentOf(D, unit).hourTicks.map((tick) => tick.y)
      for (let i = 1; i < ys.length; i += 1)
        expect(Math.abs((ys[i] ?? 0) - (ys[i - 1] ?? 0))).toBeGreaterThanOrEqual(13.9)
    }
    expect(logTicks(0.05, 3)).toEqual([0.05, 0.07, 0.1, 0.2, 0.3, 0.5, 0.7, 1, 2, 3])
  })
})
