import type { Metadata } from 'next'
import { requireVisibleLogger } from '@/app/loggers/seen'
import { RecordSheet } from '@/components/loggers/record-sheet'

export const metadata: Metadata = { title: 'Commissioning record' }

export default async function RecordPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  await requireVisibleLogger(id, `/loggers/${encodeURIComponent(id)}/commissioning`)
  return <RecordSheet loggerId={id} />
}
