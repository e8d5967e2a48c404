import {
  beginCheck,
  concludeCheck,
  lockCommissioning,
  noteSoFar,
  type CheckRow,
  type CommissioningRow,
} from '@/db/queries/commissioning'
import { asIngest, asPerson } from '@/db/roles'
import type { Rederive } from '@/lib/access/checked-write'
import type { Who } from '@/lib/auth/who'
import { calibrateLogger } from '@/lib/loggers/manage-logger'
import { Problem } from '@/lib/problem'
import type { CheckKind, Commissioning, StepCheck } from '@/shared/schemas'
import { sayAtWork } from './at-work'
import { judgeCheck } from './judge-check'
import { getCommissioning } from './read-commissionings'
import { requireOpen } from './require-commissioning'

type Given = Extract<StepCheck, { step: 'done' }>

/**
 * Begins a check, concludes it, or leaves it out with a reason. The verdict is made here from what the logger sent
 * since the check began, never from what a browser says of it; only the hand gauge's readings come from outside.
 * @throws Problem `conflict` when it was not begun or nothing is fitted yet
 */
export async function stepCheck(
  who: Who,
  id: string,
  kind: CheckKind,
  step: StepCheck,
  now: Date,
  rederive: Rederive,
): Promise<Commissioning> {
  const row = await asPerson(who.personId, (trx) => requireOpen(trx, who, id, now))
  if (row.system === null) throw new Problem('conflict', 'Choose the boat and its system first.')
  if (row.logger === null && kind !== 'leak-down-before')
    throw new Problem('conflict', 'Fit the logger first: the check reads what it sends.')
  if (step.step === 'begin') await sayAtWork(who, row, now, rederive)
  if (step.step === 'done') await conclude(who, row, { kind, step, now, rederive })
  else
    await asIngest(async (trx) => {
      await lockCommissioning(trx, id)
      const checkId = await beginCheck(trx, id, kind, now)
      if (step.step === 'leave-out')
        await concludeCheck(trx, checkId, {
          at: now,
          by: who.personId,
          outcome: 'left-out',
          given: {},
          figures: [],
          reason: step.reason,
        })
    })
  return getCommissioning(who, id, now)
}

async function conclude(
  who: Who,
  row: CommissioningRow,
  asked: { kind: CheckKind; step: Given; now: Date; rederive: Rederive },
): Promise<void> {
  const { kind, step, now, rederive } = asked
  const open = openCheck(row, kind)
  if (open === undefined) throw new Problem('conflict', 'Begin the check first.')
  const verdict = await asIngest((trx) =>
    judgeCheck(trx, row, { kind, began: new Date(open.beganAt), step, now }),
  )
  // What cannot be told yet stays open, so that it can go on from where it began.
  if (verdict.outcome === 'cannot-tell' && verdict.keepsOpen) {
    await asIngest((trx) => noteSoFar(trx, open.id, verdict))
    return
  }
  if (verdict.correction !== null && row.logger !== null)
    await calibrateLogger(
      who,
      row.logger.id,
      { ...verdict.correction, inForceFrom: verdict.correctFrom?.toISOString() },
      now,
      rederive,
    )
  await asIngest(async (trx) => {
    await lockCommissioning(trx, row.id)
    const { gaugePa, resolutionPa, leakDown } = step
    await concludeCheck(trx, open.id, {
      at: now,
      by: who.personId,
      outcome: verdict.outcome,
      figures: verdict.figures,
      reason: verdict.reason,
      given: { gaugePa, resolutionPa, leakDown, ...verdict.keeps },
    })
  })
}

const openCheck = (row: CommissioningRow, kind: CheckKind): CheckRow | undefined =>
  row.checks.findLast((check) => check.kind === kind && check.doneAt === null)
