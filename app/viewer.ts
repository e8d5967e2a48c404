import type { Viewer } from '@/components/shell/viewer'

export async function viewer(): Promise<Viewer | null> {
  const roles = process.env.MW_DEV_VIEWER
  return roles === 'owner'
    ? { name: 'R. Quayle', roles: ['owner'], shopName: null }
    : roles
      ? { name: 'S. Marsh', roles: ['manager'], shopName: 'Saltern Quay' }
      : null
}
