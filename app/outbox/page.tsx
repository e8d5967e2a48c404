import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { isDemo } from '@/app/mode'
import { OutboxSheet } from '@/components/outbox/outbox-sheet'

export const metadata: Metadata = { title: 'Outbox' }

/** In the demo and in tests only: in production there is no such page. */
export default function OutboxPage() {
  if (!isDemo()) notFound()
  return <OutboxSheet />
}
