import { expect, test } from 'vitest'
import { holdSecondsAtRate } from '@/lib/analysis/gas'
import { inHgToPa, paToInHg } from '@/shared/units'

test('common practice, no source: 0.3 inHg in 30 min = 0.6 inHg/h = 3 h at a differential of 1.8 inHg', () => {
  const ratePaPerHour = inHgToPa(0.3) / 0.5
  expect(paToInHg(ratePaPerHour)).toBeCloseTo(0.6, 12)
  expect(holdSecondsAtRate(inHgToPa(1.8), ratePaPerHour)).toBeCloseTo(3 * 3600, 8)
})
