import { expect, test } from 'vitest'
import { bestSplit } from '@/lib/analysis/steps/best-split'
import { pettitt } from '@/lib/analysis/statistics'
import { NILE } from './data-sets'
import { expectNear } from './near'

test('R datasets::Nile, Pettitt (1979): the change after 1898', () => {
  const change = pettitt(NILE)
  expect(change).toMatchObject({ k: 1617, before: 28 })
  expectNear(change?.pValue, 3.59102217693629e-7, 1e-12)
})

test('R strucchange breakpoints(Nile ~ 1) (Zeileis et al. 2003): the same year, levels and residual squares', () => {
  const years = NILE.map((value, index) => ({
    startedAt: index,
    endedAt: index + 1,
    paPerHour: value,
    sigmaPaPerHour: 1,
    value,
    weight: 1,
  }))
  const split = bestSplit(years)
  expect(split?.at).toBe(28)
  expectNear(split?.before.value, 1097.75, 1e-12)
  expectNear(split?.after.value, 849.9722222222222, 1e-12)
  expectNear((split?.before.chiSquared ?? NaN) + (split?.after.chiSquared ?? NaN), 1597457.194444, 1e-9)
})
