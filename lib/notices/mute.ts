import type { NoticeKind, StatementValue } from '@/shared/schemas/words'

export type MuteReason = 'unheard' | StatementValue

/**
 * Why notices of a kind pause: nothing is heard, or people say that the system is laid up, off or being worked
 * on. Frost does its harm in a system that is off or open as well.
 */
export function mutedBy(
  kind: NoticeKind,
  situation: { unheard: boolean; statement: StatementValue | null },
): MuteReason | null {
  if (situation.unheard) return 'unheard'
  if (kind === 'freeze' && situation.statement !== 'laid-up') return null
  return situation.statement
}

export const MUTE_WORDS: Record<MuteReason, string> = {
  unheard: 'Nothing is heard from the logger',
  'laid-up': 'The system is laid up',
  'worked-on': 'The system is being worked on',
  off: 'The system is said to be switched off',
}
