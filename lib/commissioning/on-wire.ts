import type { CheckRow, CommissioningRow } from '@/db/queries/commissioning'
import type { Channel, CheckKind, Commissioning } from '@/shared/schemas'
import { checkKindSchema } from '@/shared/schemas'

/** What only a vacuum channel can show. */
const BY_VACUUM: readonly CheckKind[] = ['leak-down-before', 'zero', 'two-point', 'leak-down-after']

/** The checks that a logger with these channels needs, in their order. */
export const checksNeeded = (channels: readonly Channel[]): CheckKind[] =>
  checkKindSchema.options.filter((kind) => {
    if (BY_VACUUM.includes(kind)) return channels.includes('vacuum')
    return kind !== 'pump-channel' || channels.includes('pump')
  })

/** The newest concluded attempt of a kind counts. */
export const lastDone = (checks: readonly CheckRow[], kind: CheckKind): CheckRow | undefined =>
  checks.findLast((check) => check.kind === kind && check.doneAt !== null)

/** Everything needed has passed or was left out with a reason. */
export const allPassed = (row: CommissioningRow): boolean =>
  row.logger !== null &&
  checksNeeded(row.logger.channels).every((kind) => {
    const outcome = lastDone(row.checks, kind)?.outcome
    return outcome === 'passed' || outcome === 'left-out'
  })

const text = (at: Date | string | null): string | null => (at === null ? null : new Date(at).toISOString())

/** As the API answers it. */
export function commissioningOnWire(row: CommissioningRow): Commissioning {
  return {
    id: row.id,
    way: row.way,
    serial: row.serial,
    userCode: row.userCode,
    startedAt: row.startedAt.toISOString(),
    startedBy: row.startedBy,
    system: row.system,
    logger: row.logger,
    fittedAt: text(row.fittedAt),
    setAsideAt: text(row.setAsideAt),
    finishedAt: text(row.finishedAt),
    finishedBy: row.finishedBy,
    passed: row.passed,
    note: row.note,
    needed: checksNeeded(row.logger?.channels ?? ['pump', 'vacuum']),
    checks: row.checks.map((check) => ({
      kind: check.kind,
      beganAt: new Date(check.beganAt).toISOString(),
      doneAt: text(check.doneAt),
      doneBy: check.doneBy,
      outcome: check.outcome,
      figures: check.figures,
      reason: check.reason,
    })),
  }
}
