import type { RepairVerdict, VisitStatus } from '@/shared/schemas'

export const STATUS_WORDS: Record<VisitStatus, string> = {
  asked: 'Asked for',
  planned: 'Planned',
  'under-way': 'Under way',
  proving: 'Proving',
  closed: 'Closed',
}

export const VERDICT_WORDS: Record<RepairVerdict, string> = {
  held: 'repair held',
  'better-under-limit': 'better, but still under the limit',
  'no-change': 'no change',
  worse: 'worse',
  'too-early': 'too early to say',
}
