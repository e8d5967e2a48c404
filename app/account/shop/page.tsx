import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { StartShop } from '@/components/account/start-shop'
import { TitleBlock } from '@/components/ui/title-block'

export const metadata: Metadata = { title: 'Start a shop' }

export default async function StartShopPage() {
  await signedInAt('/account/shop')
  return (
    <>
      <TitleBlock title="Start a shop" datum="You will be its first manager." />
      <div className="sheet">
        <StartShop />
      </div>
    </>
  )
}
