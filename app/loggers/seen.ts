import { notFound } from 'next/navigation'
import { requireViewer } from '@/lib/auth/page'
import { loggerSeen } from '@/lib/commissioning/logger-seen'
import { idSchema } from '@/shared/schemas'

/** A logger the reader may see; any other does not exist for them. */
export async function requireVisibleLogger(id: string, path: string): Promise<void> {
  const who = await requireViewer(path)
  if (!idSchema.safeParse(id).success || !(await loggerSeen(who, id, new Date()))) notFound()
}
