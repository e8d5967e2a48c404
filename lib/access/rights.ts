import type { Standing } from '@/db/queries/access'
import type { Rights } from '@/shared/schemas'

/** What a person may do with a vessel, from how they stand to it. Sight itself is decided by the database. */
export function rightsOf(standing: Standing): Rights {
  const { owns, keeps, fullRecord } = standing
  const is = (...roles: string[]): boolean => standing.roles.some((role) => roles.includes(role))
  return {
    fullRecord,
    changeVessel: owns || keeps,
    changeQuietHours: owns || keeps,
    changeSettings: owns || is('technician', 'installer', 'manager'),
    registerLogger: owns || is('installer', 'manager'),
    giveAccess: owns,
    // Presence belongs to the full record: who may not read it may not write it either.
    setAboard: owns || (fullRecord && is('technician', 'manager')) || keeps,
    setStatement: owns || is('technician', 'installer', 'manager'),
    askVisit: owns || is('technician', 'manager'),
    workVisit: is('technician', 'manager'),
    assignVisit: is('manager'),
    acknowledge: owns || is('technician', 'manager'),
  }
}
