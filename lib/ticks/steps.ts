import { z } from 'zod'
import type { Trx } from '@/db/roles'
import {
  addEvent,
  closeNotice,
  openNotice,
  openNoticesOf,
  snoozedKinds,
  worsenNotice,
  type OpenNotice,
} from '@/db/queries/notice-writes'
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
  if (standing !== undefined) {
    return last === undefined ? null : stepFurther(trx, standing, vessel.timeZone, last, now)
  }
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
  const opened = await openNotice(trx, {
    systemId,
    vesselId: vessel.vesselId,
    kind: 'step',
    at: now,
    ...(await describe(trx, vessel.timeZone, step)),
  })
  return opened?.eventId ?? null
}

/** A step after the one that is told: down again ends it, up once more is told as worse. */
async function stepFurther(
  trx: Trx,
  notice: OpenNotice,
  timeZone: string,
  last: Step,
  now: Date,
): Promise<string | null> {
  const told = stepEvidenceSchema.safeParse(notice.evidence)
  if (!told.success || last.between[0] < Date.parse(told.data.between[1])) return null
  if (last.toPaPerHour <= told.data.fromPaPerHour * BACK_WITHIN) {
    await closeNotice(trx, notice.id, now)
    return addEvent(trx, notice.id, 'ended', {
      at: now,
      reason: 'The leak is back where it was before the step',
    })
  }
  if (last.toPaPerHour <= told.data.toPaPerHour || notice.heldSince !== null) return null
  const found = await describe(trx, timeZone, last)
  await worsenNotice(trx, notice.id, found)
  return addEvent(trx, notice.id, 'worsened', { at: now, ...found })
}

const stepEvidenceSchema = z.object({
  fromPaPerHour: z.number(),
  toPaPerHour: z.number(),
  between: z.tuple([z.string(), z.string()]),
})

async function describe(
  trx: Trx,
  timeZone: string,
  step: Step,
): Promise<{ severity: number; reason: string; evidence: Record<string, unknown> }> {
  const [since = '', until = ''] = await localMoments(
    trx,
    timeZone,
    step.between.map((at) => new Date(at)),
  )
  return {
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
  }
}
