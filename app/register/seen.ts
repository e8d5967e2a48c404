import { notFound } from 'next/navigation'
import { requireViewer } from '@/lib/auth/page'
import { getCommissioning } from '@/lib/commissioning/read-commissionings'
import { Problem } from '@/lib/problem'
import { idSchema, type Commissioning } from '@/shared/schemas'

/** A registration that the reader may work on; any other does not exist for them. */
export async function requireCommissioningSeen(id: string): Promise<Commissioning> {
  const who = await requireViewer(`/register/${encodeURIComponent(id)}`)
  if (!idSchema.safeParse(id).success) notFound()
  try {
    return await getCommissioning(who, id, new Date())
  } catch (error) {
    if (error instanceof Problem && (error.status === 404 || error.status === 403)) notFound()
    throw error
  }
}
