import { span } from '@/components/time'
import type { Logger, LoggerHealth } from '@/shared/schemas'

/** Where a logger is in its life, the first that fits. */
export type LoggerPlace = 'retired' | 'stock' | 'silent' | 'assigned'
export const PLACE_WORDS: Record<LoggerPlace, string> = {
  assigned: 'Assigned',
  silent: 'Silent',
  stock: 'Stock',
  retired: 'Retired',
}
export const PLACES: readonly LoggerPlace[] = ['silent', 'assigned', 'stock', 'retired']

/** A system's silence limit where none was said; the usual of the set-up. */
const SILENCE_SECONDS = 21_600
/** Contract of uploads: further off than this, sample times are shifted. */
export const CLOCK_LIMIT_SECONDS = 120

export interface LoggerView {
  logger: Logger
  health: LoggerHealth | undefined
  place: LoggerPlace
  /** What is the matter with it, in words; none for one that is well. */
  matters: string[]
}

/**
 * A logger with what is the matter with it now: silent for longer than its system's limit, a clock over two minutes
 * off, a supply under its system's figure. One in stock or retired is expected to be still.
 */
export function viewOf(logger: Logger, health: LoggerHealth | undefined, nowMs: number): LoggerView {
  const place = placeOf(logger, health, nowMs)
  const matters: string[] = []
  if (place === 'silent')
    matters.push(
      logger.lastHeardAt === null
        ? 'not heard yet'
        : `silent for ${span((nowMs - Date.parse(logger.lastHeardAt)) / 1000)}`,
    )
  if (place === 'silent' || place === 'assigned') {
    const offset = logger.clockOffsetSeconds
    if (offset !== null && Math.abs(offset) > CLOCK_LIMIT_SECONDS)
      matters.push(`clock ${span(offset)} ${offset > 0 ? 'ahead' : 'behind'}`)
    const { supplyV = null, lowSupplyV = null } = health ?? {}
    if (supplyV !== null && lowSupplyV !== null && supplyV < lowSupplyV)
      matters.push(`supply low, ${supplyV.toFixed(1)} V`)
  }
  return { logger, health, place, matters }
}

function placeOf(logger: Logger, health: LoggerHealth | undefined, nowMs: number): LoggerPlace {
  if (logger.retiredAt !== null) return 'retired'
  if (logger.fitted === null) return 'stock'
  const limit = health?.silenceSeconds ?? SILENCE_SECONDS
  // One just registered has its time to be heard from the making of its key.
  const since = logger.lastHeardAt ?? logger.keyMadeAt
  return since === null || nowMs - Date.parse(since) > limit * 1000 ? 'silent' : 'assigned'
}

/** Those with something the matter first, then by serial. */
export const sortViews = (views: readonly LoggerView[]): LoggerView[] =>
  [...views].sort(
    (a, b) => b.matters.length - a.matters.length || a.logger.serial.localeCompare(b.logger.serial),
  )

const many = (count: number, one: string, more: string) => `${count} ${count === 1 ? one : more}`

/** The sheet's sentence: `loggersFinding(views)` → "2 of 12 loggers want a look: one silent, one clock off." */
export function loggersFinding(views: readonly LoggerView[]): string {
  const inUse = views.filter(({ place }) => place === 'assigned' || place === 'silent')
  const stock = views.filter(({ place }) => place === 'stock').length
  const stockWords = stock === 0 ? '' : ` ${many(stock, 'waits', 'wait')} in stock.`
  if (inUse.length === 0) return `No logger is on a boat yet.${stockWords}`
  const matters = inUse.filter((view) => view.matters.length > 0)
  const awaited = inUse.filter(
    ({ logger, place }) => place === 'assigned' && logger.lastHeardAt === null,
  ).length
  if (matters.length === 0 && awaited > 0)
    return `${inUse.length - awaited} of ${many(inUse.length, 'logger', 'loggers')} on boats ${inUse.length - awaited === 1 ? 'is' : 'are'} heard and well; ${awaited} just registered ${awaited === 1 ? 'is' : 'are'} not heard yet.${stockWords}`
  if (matters.length === 0)
    return `${inUse.length === 1 ? 'The one logger on a boat is' : `All ${inUse.length} loggers on boats are`} heard and well.${stockWords}`
  const count = (test: (view: LoggerView) => boolean) => matters.filter(test).length
  const silent = count(({ place }) => place === 'silent')
  const clocks = count((view) => view.matters.some((text) => text.startsWith('clock')))
  const supplies = count((view) => view.matters.some((text) => text.startsWith('supply')))
  const parts = [
    silent > 0 ? `${silent} not heard` : '',
    clocks > 0 ? many(clocks, 'clock off', 'clocks off') : '',
    supplies > 0 ? `${supplies} low on supply` : '',
  ].filter((part) => part !== '')
  return `${matters.length} of ${many(inUse.length, 'logger', 'loggers')} on boats ${matters.length === 1 ? 'wants' : 'want'} a look: ${parts.join(', ')}.${stockWords}`
}
