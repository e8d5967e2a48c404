'use client'

import Link from 'next/link'
import { PLACE_WORDS, type LoggerView } from '@/components/loggers/health'
import { LoggerActs } from '@/components/loggers/logger-acts'
import { useLoggers } from '@/components/loggers/use-loggers'
import { clockWords } from '@/components/register/live-line'
import { ago, dayOf } from '@/components/time'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import { formatDuration, UNKNOWN } from '@/shared/units'

/** One logger: where it is, how it is, and what can be done with it. */
export function LoggerSheet({ id }: { id: string }) {
  const { views, error, now, refresh } = useLoggers()
  const view = views?.find(({ logger }) => logger.id === id)
  return (
    <>
      <TitleBlock
        title={view?.logger.serial ?? 'Logger'}
        datum="Times in UTC. What a logger measured stays with the boat that it was on."
      />
      <div className="sheet">
        {error && !views ? <Trouble title={error.message} retry={() => void refresh()} /> : null}
        {!views && !error ? <Loading what="the logger" /> : null}
        {views && !view ? <Empty title="There is no such logger, or it is not yours to see" /> : null}
        {view ? (
          <div className="grid items-start gap-x-16 gap-y-10 lg:grid-cols-2">
            <div>
              <p className="mb-4 text-finding tracking-[-0.015em]">{loggerFinding(view, now)}</p>
              <Lines view={view} nowMs={now} />
              <Link href={`/loggers/${id}/commissioning`} className="mt-3 inline-flex min-h-11 items-center">
                Commissioning record
              </Link>
            </div>
            <LoggerActs view={view} refresh={refresh} />
          </div>
        ) : null}
      </div>
    </>
  )
}

/** Where it is and whether it is well, in a sentence. */
export function loggerFinding({ logger, place, matters }: LoggerView, nowMs: number): string {
  const boat = logger.fitted
    ? [logger.fitted.vesselName, logger.fitted.systemName].filter(Boolean).join(', ')
    : ''
  if (place === 'retired') return `Retired${logger.retiredAt ? ` ${ago(logger.retiredAt, nowMs)}` : ''}.`
  if (place === 'stock') return 'In stock: on no boat.'
  if (matters.length === 0)
    return logger.lastHeardAt === null
      ? `On ${boat}, just registered and not heard yet.`
      : `On ${boat}, heard and well.`
  return `On ${boat}: ${matters.join('; ')}.`
}

function Lines({ view, nowMs }: { view: LoggerView; nowMs: number }) {
  const { logger, health, place } = view
  const lines: [string, string][] = [
    ['Stands', PLACE_WORDS[place]],
    ['Heard', logger.lastHeardAt ? ago(logger.lastHeardAt, nowMs) : 'not yet'],
    ['Sends every', formatDuration(logger.intervalSeconds)],
    ['Measures', logger.channels.join(', ')],
    ['Clock', logger.clockOffsetSeconds === null ? UNKNOWN : clockWords(logger.clockOffsetSeconds)],
    [
      'Supply',
      health?.supplyV == null
        ? UNKNOWN
        : `${health.supplyV.toFixed(1)} V${health.lowSupplyV === null ? '' : `; low under ${health.lowSupplyV} V`}`,
    ],
    ['Key made', logger.keyMadeAt ? dayOf(logger.keyMadeAt, 0, nowMs) : UNKNOWN],
  ]
  return (
    <table className="ruled">
      <tbody>
        {logger.fitted ? (
          <tr>
            <th scope="row" className="w-[36%]">
              Fitted to
            </th>
            <td>
              <Link href={`/vessels/${logger.fitted.vesselId}?system=${logger.fitted.systemId}`}>
                {[logger.fitted.vesselName, logger.fitted.systemName].filter(Boolean).join(', ')}
              </Link>
            </td>
          </tr>
        ) : null}
        {lines.map(([name, value]) => (
          <tr key={name}>
            <th scope="row" className="w-[36%]">
              {name}
            </th>
            <td>{value}</td>
          </tr>
        ))}
      </tbody>
    </table>
  )
}
