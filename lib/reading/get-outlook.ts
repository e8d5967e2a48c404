import { asIngest, asPerson } from '@/db/roles'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import { rightsOf } from '@/lib/access/rights'
import { outlookAt } from '@/lib/outlook/outlook-at'
import type { Outlook } from '@/shared/schemas'

const instant = (ms: number): string => new Date(ms).toISOString()

/** What the coming night, or the one under way at `at`, brings. @throws Problem `not-found` */
export async function getOutlook(personId: string, systemId: string, at: Date): Promise<Outlook> {
  const standing = await asPerson(personId, (trx) => requireSystemRight(trx, systemId, null))
  const outlook = await asIngest((trx) => outlookAt(trx, systemId, at))
  if (outlook === null) throw noSuch('system')
  const { night, firstRun } = outlook
  return {
    at: instant(outlook.at),
    night: {
      from: instant(night.from),
      to: instant(night.to),
      timeZone: outlook.timeZone,
      hours: night.hours,
    },
    bedtime: instant(night.bedtime),
    chance: outlook.chance,
    chanceIfFlushedLast: outlook.chanceIfFlushedLast,
    expectedRuns: outlook.expectedRuns,
    firstRun: firstRun && {
      at: firstRun.at === null ? null : instant(firstRun.at),
      earliest: instant(firstRun.earliest),
      latest: instant(firstRun.latest),
    },
    basis: outlook.basis,
    aboard: rightsOf(standing).fullRecord ? outlook.aboard : 'unknown',
  }
}
