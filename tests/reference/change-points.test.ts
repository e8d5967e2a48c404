import { expect, test } from 'vitest'
import { pettitt } from '@/lib/analysis/statistics'
import { NILE } from './data-sets'
import { expectNear } from './near'

test('R datasets::Nile, Pettitt (1979): the change after 1898', () => {
  const change = pettitt(NILE)
  expect(change).toMatchObject({ k: 1617, before: 28 })
  expectNear(change?.pValue, 3.59102217693629e-7, 1e-12)
})
