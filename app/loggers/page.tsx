import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { LoggersSheet } from '@/components/loggers/loggers-sheet'

export const metadata: Metadata = { title: 'Loggers' }

export default async function LoggersPage() {
  await signedInAt('/loggers')
  return <LoggersSheet />
}
