'use client'

import { useMemo } from 'react'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { sortViews, viewOf, type LoggerView } from '@/components/loggers/health'
import type { List, Logger, LoggerHealth } from '@/shared/schemas'

const LOGGERS = '/api/loggers?limit=5000'
const HEALTH = '/api/loggers/health?limit=5000'

/** Every logger one sees, with what is the matter with it. */
export function useLoggers() {
  const now = useNow()
  const loggers = useApi<List<Logger>>(LOGGERS, { refreshMs: 60_000 })
  const health = useApi<List<LoggerHealth>>(HEALTH, { refreshMs: 60_000 })
  const views: LoggerView[] | undefined = useMemo(() => {
    if (loggers.data === undefined) return undefined
    const byId = new Map(health.data?.items.map((item) => [item.loggerId, item]))
    return sortViews(loggers.data.items.map((logger) => viewOf(logger, byId.get(logger.id), now)))
  }, [loggers.data, health.data, now])
  return { views, error: loggers.error, now, refresh: () => loggers.mutate() }
}
