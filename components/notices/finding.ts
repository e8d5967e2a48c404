import { NOTICE_WORDS } from '@/components/notices/words'
import type { Notice } from '@/shared/schemas'

/** The open notices in a sentence: how many, on how many boats, and how many nobody has looked at. */
export function noticesFinding(notices: readonly Notice[]): string {
  const only = notices[0]
  if (only === undefined) return 'Nothing stands open.'
  const unseen = notices.filter((notice) => notice.acknowledgedAt === null).length
  const seen =
    unseen === 0 ? 'all seen' : unseen === notices.length ? 'none seen yet' : `${unseen} not seen yet`
  if (notices.length === 1)
    return `${NOTICE_WORDS[only.kind]} on ${only.vesselName}${unseen === 0 ? ', seen' : ', not seen yet'}.`
  const boats = new Set(notices.map((notice) => notice.vesselId)).size
  return `${notices.length} stand open on ${boats} ${boats === 1 ? 'boat' : 'boats'}, ${seen}.`
}
