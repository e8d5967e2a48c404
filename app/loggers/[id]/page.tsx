import type { Metadata } from 'next'
import { requireVisibleLogger } from '@/app/loggers/seen'
import { LoggerSheet } from '@/components/loggers/logger-sheet'

export const metadata: Metadata = { title: 'Logger' }

export default async function LoggerPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await requireVisibleLogger(id, `/loggers/${encodeURIComponent(id)}`)
  return <LoggerSheet id={id} />
}
