import type { ReactNode } from 'react'
import { requireVisibleVessel } from '@/app/visible-vessel'
import { VesselFrame } from '@/components/vessel/vessel-frame'

type Props = { children: ReactNode; params: Promise<{ id: string }> }

export default async function VesselLayout({ children, params }: Props) {
  const { id } = await params
  await requireVisibleVessel(id)
  return <VesselFrame id={id}>{children}</VesselFrame>
}
