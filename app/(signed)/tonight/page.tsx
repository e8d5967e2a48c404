import type { Metadata } from 'next'
import { TonightSheet } from '@/components/tonight/tonight-sheet'

export const metadata: Metadata = { title: 'Tonight' }

export default function TonightPage() {
  return (
    <div className="sheet pt-7">
      <h1 className="sr-only">Tonight</h1>
      <TonightSheet />
    </div>
  )
}
