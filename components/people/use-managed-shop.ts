'use client'

import { useSearchParams } from 'next/navigation'
import { useApi } from '@/components/data/use-api'
import type { Me } from '@/shared/schemas'

type OwnShop = Me['shops'][number]

/** The shop that the address names, else the first of those one manages. */
export function useManagedShop() {
  const chosen = useSearchParams().get('shop')
  const { data: me, error } = useApi<Me>('/api/me')
  const shops: OwnShop[] = me?.shops.filter((shop) => shop.roles.includes('manager')) ?? []
  return { me, error, shops, shop: shops.find((candidate) => candidate.id === chosen) ?? shops[0] }
}
