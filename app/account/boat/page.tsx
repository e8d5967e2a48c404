import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { NewBoat } from '@/components/account/new-boat'
import { TitleBlock } from '@/components/ui/title-block'

export const metadata: Metadata = { title: 'A boat of your own' }

export default async function NewBoatPage() {
  await signedInAt('/account/boat')
  return (
    <>
      <TitleBlock title="A boat of your own" datum="A shop can be let in later; none is needed." />
      <div className="sheet">
        <NewBoat />
      </div>
    </>
  )
}
