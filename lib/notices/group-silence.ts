import type { SilentSystem } from '@/db/queries/silence'

const TOGETHER_MS = 3_600_000
/** So many loggers of one harbour falling silent within the hour are its network, not they. */
const HARBOUR_AT_LEAST = 3

export interface SilenceToTell {
  /** The system whose notice it becomes: the first that fell silent. */
  first: SilentSystem
  /** All systems it stands for, the first among them. */
  systems: SilentSystem[]
  reason: 'harbour-network' | 'one-logger'
}

/**
 * Which silences are news: one notice for three or more loggers of one harbour and shop that fell silent within
 * an hour, one each for the others. Those near their limit join a group; alone they wait for it.
 * @param silent ordered by when each was last heard.
 */
export function groupSilence(silent: SilentSystem[]): SilenceToTell[] {
  const fresh = silent.filter((system) => system.noticeId === null && !system.covered)
  const told = new Set<string>()
  const news: SilenceToTell[] = []
  for (const first of fresh) {
    if (!first.overdue || told.has(first.systemId)) continue
    const together = fresh.filter(
      (other) => !told.has(other.systemId) && sameHarbour(first, other) && near(first, other),
    )
    const isNetwork = together.length >= HARBOUR_AT_LEAST
    const systems = isNetwork ? together : [first]
    for (const system of systems) told.add(system.systemId)
    news.push({ first: systems[0] ?? first, systems, reason: isNetwork ? 'harbour-network' : 'one-logger' })
  }
  return news
}

const sameHarbour = (a: SilentSystem, b: SilentSystem): boolean =>
  a.harbour !== null && a.shopId !== null && a.harbour === b.harbour && a.shopId === b.shopId

const near = (a: SilentSystem, b: SilentSystem): boolean =>
  Math.abs(a.lastHeardAt.getTime() - b.lastHeardAt.getTime()) <= TOGETHER_MS
