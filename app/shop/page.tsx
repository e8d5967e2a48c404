import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { ShopSheet } from '@/components/shop/shop-sheet'

export const metadata: Metadata = { title: 'Shop' }

export default async function ShopPage() {
  await signedInAt('/shop')
  return <ShopSheet />
}
