/** Who is reading, as far as the pages need to know; null when nobody is signed in. */
export type Role = 'owner' | 'technician' | 'installer' | 'manager'
export type Viewer = { name: string; roles: readonly Role[] }

export const worksForShop = (viewer: Viewer): boolean => viewer.roles.some((role) => role !== 'owner')

/** Where a person starts: the shop's people at the fleet, owners at tonight. */
export const homeOf = (viewer: Viewer): string => (worksForShop(viewer) ? '/fleet' : '/tonight')
