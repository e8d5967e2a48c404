import type { Trx } from '@/db/roles'
import { addEvent, closeNotice, openNotice, openNoticesOf, snoozedKinds } from '@/db/queries/notice-writes'
import { localMoments } from '@/db/queries/outlooks'
import { legsKnown } from '@/db/queries/record-rows'
import { statementInForce, vesselOfSystem } from '@/db/queries/judged'
import { systemsWithNewLegs } from '@/db/queries/steps-due'
import { findSteps, type Step } from '@/lib/analysis/steps'
import { log } from '@/lib/log'
import { tell } from '@/lib/messages/tell'
import type { Tick } from '@/lib/ticks/run-tick'

const DAY_MS = 86_400_000
const LOOK_BACK_MS = 21 * DAY_MS
const LEG_LIMIT = 400
/** Only a step of the last days is news. */
const NEWS_MS = 3 * DAY_MS
/** A 95 % interval is 3.92 standard errors wide. */
const SIGMAS_WIDE = 3.92
/** The leak counts as back where it was within this much of the rate before the step. */
const BACK_WITHIN = 1.15

/** Looks for a leak that grew at once, in systems that were heard since the last look. */
export const stepsTick: Tick = { name: 'steps', role: 'service', work: lookForSteps }

export async function lookForSteps(trx: Trx, now: Date): Promise<Record<string, number>> {
  const eventIds: string[] = []
  for (const systemId of await systemsWithNewLegs(trx, new Date(now.getTime() - DAY_MS))) {
    try {
      const eventId = await trx.transaction((inner) => judgeStep(inner, systemId, now))
      if (eventId !== null) eventIds.push(eventId)
    } catch (error) {
      log.error({ systemId, error: String(error) }, 'steps of this system could not be looked for')
    }
  }
  await tell(trx, eventIds, now)
  return { changed: eventIds.length }
}

async function judgeStep(trx: Trx, systemId: string, now: Date): Promise<string | null> {
  const vessel = await vesselOfSystem(trx, systemId)
  if (vessel === null || (await statementInForce(trx, systemId, now)) !== null) return null
  const span = { fromMs: now.getTime() - LOOK_BACK_MS, atMs: now.getTime() }
  const legs = await legsKnown(trx, systemId, span, LEG_LIMIT)
  const steps = findSteps(
    legs.flatMap((leg) =>
      leg.rate === null || leg.setAside
        ? []
        : [
            {
              startedAt: leg.startedAt,
              endedAt: leg.endedAt,
              paPerHour: leg.rate.paPerHour,
              sigmaPaPerHour: (leg.rate.high - leg.rate.low) / SIGMAS_WIDE,
            },
          ],
    ),
  )
  const last = steps.at(-1)
  const standing = (await openNoticesOf(trx, systemId)).find((notice) => notice.kind === 'step')
  if (standing !== undefined) return last === undefined ? null : endIfBack(trx, standing, last, now)
  if (last === undefined || last.toPaPerHour <= last.fromPaPerHour) return null
  if (now.getTime() - last.between[1] > NEWS_MS) return null
  if ((await snoozedKinds(trx, systemId, now)).includes('step')) return null
  return openStep(trx, systemId, vessel, last, now)
}

async function openStep(
  trx: Trx,
  systemId: string,
  vessel: { vesselId: string; timeZone: string },
  step: Step,
  now: Date,
): Promise<string | null> {
  const [since = '', until = ''] = await localMoments(
    trx,
    vessel.timeZone,
    step.between.map((at) => new Date(at)),
  )
  const opened = await openNotice(trx, {
    systemId,
    vesselId: vessel.vesselId,
    kind: 'step',
    at: now,
    severity: step.toPaPerHour / Math.max(1, step.fromPaPerHour),
    reason: `The leak grew at once between ${since} and ${until}`,
    evidence: {
      fromPaPerHour: step.fromPaPerHour,
      toPaPerHour: step.toPaPerHour,
      strength: step.strength,
      between: step.between.map((at) => new Date(at).toISOString()),
      sinceLocal: since,
      untilLocal: until,
    },
  })
  return opened?.eventId ?? null
}

async function endIfBack(
  trx: Trx,
  notice: { id: string; evidence: Record<string, unknown> },
  last: Step,
  now: Date,
): Promise<string | null> {
  const before = notice.evidence.fromPaPerHour
  const isBack =
    last.toPaPerHour < last.fromPaPerHour &&
    typeof before === 'number' &&
    last.toPaPerHour <= before * BACK_WITHIN
  if (!isBack) return null
  await closeNotice(trx, notice.id, now)
  return addEvent(trx, notice.id, 'ended', {
    at: now,
    reason: 'The leak is back where it was before the step',
  })
}
