import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { TonightSheet } from '@/components/tonight/tonight-sheet'

export const metadata: Metadata = { title: 'Tonight' }

export default async function TonightPage() {
  await signedInAt('/tonight')
  return (
    <div className="sheet pt-7">
      <h1 className="sr-only">Tonight</h1>
      <TonightSheet />
    </div>
  )
}
