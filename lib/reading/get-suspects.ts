import { noteSeen } from '@/db/queries/audit'
import { flushesKnown, holdsKnown, legsKnown, runsKnown } from '@/db/queries/record-rows'
import { readSuspectsPlace } from '@/db/queries/suspects'
import { readLegRates } from '@/db/queries/trend'
import { zoneOffsets } from '@/db/queries/zones'
import { asIngest, asPerson, type Trx } from '@/db/roles'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import { figuresOf } from '@/lib/analysis/figures'
import { standardPressurePa } from '@/lib/analysis/gas'
import {
  KINDS_OF_FAMILY,
  priorFactorsOf,
  suspectsOf,
  type FamilySuspect,
  type RecordSuspects,
} from '@/lib/analysis/signatures'
import { findSteps, type Step } from '@/lib/analysis/steps'
import { cupTestsKnown } from '@/lib/cup-tests'
import { figuresBasis } from '@/lib/figures'
import type { Suspect, Suspects } from '@/shared/schemas'

const DAY_MS = 86_400_000
/** Weeks tell a steady leak from one that comes and goes; beyond these an older plant is described. */
const LOOK_BACK_DAYS = 42
const MOST_LEGS = 300
const ENOUGH_LEGS = 30

/**
 * The likeliest suspects that a system's record names before anybody goes, as known at `at`, and the factors they
 * put on an isolation's priors. The record is read from the last change to a part on: what was mended is no evidence.
 * @throws Problem `not-found`, `not-allowed` without the full record
 */
export async function getSuspects(
  personId: string,
  systemId: string,
  at: Date,
  now: Date,
): Promise<Suspects> {
  await asPerson(personId, async (trx) => {
    const { vesselId, owns } = await requireSystemRight(trx, systemId, 'fullRecord')
    if (!owns) await noteSeen(trx, { at: now, personId, vesselId, action: 'record.seen', everyHours: 24 })
  })
  const found = await asIngest((trx) => suspectsAt(trx, systemId, at))
  if (found === null) throw noSuch('system')
  return found
}

/**
 * The same for whoever may know.
 * @param trx under the service's role: samples and checkpoints are read
 * @returns null when there is no such system
 */
export async function suspectsAt(trx: Trx, systemId: string, at: Date): Promise<Suspects | null> {
  const basis = await figuresBasis(trx, systemId, at.getTime())
  const place = await readSuspectsPlace(trx, systemId, at)
  if (basis === null || place === null) return null
  const fromMs = Math.max(at.getTime() - LOOK_BACK_DAYS * DAY_MS, place.changedAt?.getTime() ?? 0)
  const from = new Date(fromMs)
  const span = { atMs: at.getTime(), fromMs }
  const steps = findSteps(await readLegRates(trx, systemId, { from, to: at, at, limit: MOST_LEGS }))
  const offsets = await zoneOffsets(trx, place.timeZone, from, new Date(at.getTime() + DAY_MS))
  const legs = sinceStep(await legsKnown(trx, systemId, span, MOST_LEGS), steps, fromMs)
  const found = suspectsOf({
    at: at.getTime(),
    legs,
    runs: await runsKnown(trx, systemId, span),
    holds: (await holdsKnown(trx, systemId, span)).filter((hold) => hold.startedAt >= fromMs),
    flushes: await flushesKnown(trx, systemId, span),
    figures: figuresOf(basis.input),
    standardPressurePa: standardPressurePa(basis.setUp.altitudeM),
    steps,
    cupTests: await cupTestsKnown(trx, systemId, at.getTime(), fromMs),
    offsets: offsets.map((offset) => ({ from: offset.from.getTime(), seconds: offset.seconds })),
  })
  return {
    at: at.toISOString(),
    from: from.toISOString(),
    verdict: verdictOf(found),
    suspects: found.families.map(onWire),
    cleared: found.cleared.map(onWire),
    notEnough: found.notEnough,
    inseparable: [...found.inseparable],
    priorFactors: priorFactorsOf(found, place.parts),
  }
}

/**
 * The legs that speak of the leak as it is: from the last change to a part on, and from the last step on where
 * enough has been measured since, else a level that changed once passes for one that changes with the hours.
 */
function sinceStep<Leg extends { startedAt: number }>(
  legs: readonly Leg[],
  steps: readonly Step[],
  fromMs: number,
): Leg[] {
  const known = legs.filter((leg) => leg.startedAt >= fromMs)
  const stepAt = steps[steps.length - 1]?.between[1] ?? fromMs
  const since = known.filter((leg) => leg.startedAt >= stepAt)
  return since.length >= ENOUGH_LEGS ? since : known
}

/** Nobody is named only where valves, the likeliest of all, could have been and were not. */
function verdictOf({ families, notEnough }: RecordSuspects): Suspects['verdict'] {
  if (families.length > 0) return 'named'
  return notEnough.some(({ signature }) => signature === 'changes-across-flushes') ? 'not-enough' : 'nobody'
}

const onWire = ({ family, factor, basis, overturnedBy }: FamilySuspect): Suspect => ({
  family,
  strength: factor,
  basis,
  overturnedBy,
  parts: [...KINDS_OF_FAMILY[family]],
})
