import { readSetUpLog } from '@/db/queries/audit'
import { namesSeen } from '@/db/queries/people'
import { readParts, readSettings } from '@/db/queries/systems'
import { readVessel } from '@/db/queries/vessels'
import { zoneOffsets } from '@/db/queries/zones'
import { asIngest, asPerson } from '@/db/roles'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import { listTestPoints, TEST_POINTS } from '@/lib/analysis/isolation'
import type { SetUp } from '@/shared/schemas'
import { setUpEntry } from './set-up-changes'

const LAST = 100
const TWO_YEARS_MS = 730 * 86_400_000

/** What follows from a system's drawing, and what was changed of its set-up by whom. @throws Problem `not-found` */
export async function getSetUp(personId: string, systemId: string, now: Date): Promise<SetUp> {
  const standing = await asPerson(personId, (trx) => requireSystemRight(trx, systemId, null))
  const rows = await asIngest((trx) => readSetUpLog(trx, standing.vesselId, systemId, LAST))
  return asPerson(personId, async (trx) => {
    const vessel = await readVessel(trx, standing.vesselId, now)
    const [setting] = await readSettings(trx, [systemId], now)
    if (vessel === null || setting === undefined) throw noSuch('system')
    const parts = await readParts(trx, systemId)
    // Somebody of another shop stays without a name: the trail must not say more than the boat does.
    const names = await namesSeen(
      trx,
      rows.flatMap((row) => (row.personId === null ? [] : [row.personId])),
    )
    const offsets = await zoneOffsets(trx, vessel.timeZone, new Date(now.getTime() - TWO_YEARS_MS), now)
    return {
      testPoints: listTestPoints(
        parts.map((part) => ({ ...part, volumeM3: part.volumeM3 ?? 0 })),
        setting.kind,
      ).map((point) => {
        const { what, drawnBy, switchSees, minutes, tools, cleared } = TEST_POINTS[point.kind]
        return { ...point, what, drawnBy, switchSees, minutes, tools, cleared }
      }),
      history: rows.flatMap((row) => {
        const entry = setUpEntry(row, row.personId === null ? null : (names.get(row.personId) ?? null))
        return entry === null ? [] : [entry]
      }),
      offsets: offsets.map((offset) => ({ from: offset.from.toISOString(), seconds: offset.seconds })),
    }
  })
}
