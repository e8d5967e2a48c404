import type { Metadata } from 'next'
import type { ReactNode } from 'react'
import { requireVisibleVessel, vesselTitle } from '@/app/visible-vessel'
import { VesselFrame } from '@/components/vessel/vessel-frame'

type Props = { children: ReactNode; params: Promise<{ id: string }> }

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const name = await vesselTitle((await params).id)
  return { title: { default: name, template: `%s · ${name} · Middlewatch` } }
}

export default async function VesselLayout({ children, params }: Props) {
  const { id } = await params
  await requireVisibleVessel(id)
  return <VesselFrame id={id}>{children}</VesselFrame>
}
