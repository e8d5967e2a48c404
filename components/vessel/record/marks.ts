import type { StepMark, VisitMark } from '@/components/charts/annotations'
import { dayAndClock, offsetAt, type ZoneOffset } from '@/components/time'
import type { Step, Visit } from '@/shared/schemas'

/** Steps as they are drawn and named: "step, Tue 14:10 to Tue 17:25". */
export function stepMarks(steps: readonly Step[], offsets: readonly ZoneOffset[], nowMs: number): StepMark[] {
  return steps.map(({ between: [from, to] }) => {
    const at = (instant: string) => dayAndClock(instant, offsetAt(offsets, Date.parse(instant)), nowMs)
    return { fromMs: Date.parse(from), toMs: Date.parse(to), label: `step, ${at(from)} to ${at(to)}` }
  })
}

/** Visits that took place, on the system or on the boat as a whole, at their end. */
export function visitMarks(visits: readonly Visit[], systemId: string): VisitMark[] {
  return visits.flatMap((visit) => {
    const at = visit.finishedAt ?? visit.startedAt
    if (at === null || (visit.systemId !== null && visit.systemId !== systemId)) return []
    return [{ atMs: Date.parse(at), label: visit.summary ? `visit: ${visit.summary.slice(0, 40)}` : 'visit' }]
  })
}
