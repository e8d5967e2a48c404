import type { Metadata } from 'next'
import { signedInAt } from '@/app/viewer'
import { PeopleSheet } from '@/components/people/people-sheet'

export const metadata: Metadata = { title: 'People' }

export default async function PeoplePage() {
  await signedInAt('/people')
  return <PeopleSheet />
}
