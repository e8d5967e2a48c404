import type { Role } from '@/shared/schemas'

export const ROLES: readonly { role: Role; word: string; does: string }[] = [
  { role: 'technician', word: 'Technician', does: 'works visits, runs gauge tests, sends reports' },
  { role: 'installer', word: 'Installer', does: 'registers and proves loggers' },
  { role: 'manager', word: 'Manager', does: 'assigns visits, invites people, sets the shop up' },
]

/** "3 people are in the shop; 1 invitation waits." */
export function peopleFinding(people: number, waiting: number): string {
  const are = people === 1 ? 'You are the only one in the shop' : `${people} people are in the shop`
  if (waiting === 0) return `${are}.`
  return `${are}; ${waiting === 1 ? '1 invitation waits' : `${waiting} invitations wait`}.`
}
