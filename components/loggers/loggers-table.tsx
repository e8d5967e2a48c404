import Link from 'next/link'
import { PLACE_WORDS, type LoggerView } from '@/components/loggers/health'
import { clockWords } from '@/components/register/live-line'
import { span } from '@/components/time'
import { UNKNOWN } from '@/shared/units'

const GRID =
  'grid grid-cols-2 gap-x-4 sm:grid-cols-[minmax(8rem,1.2fr)_minmax(10rem,2fr)_6.5rem_7rem_5rem] sm:items-baseline'

/** One logger a row; on a phone its cells stack. */
export function LoggersTable({ views, nowMs }: { views: readonly LoggerView[]; nowMs: number }) {
  return (
    <div role="table" aria-label="Loggers" aria-rowcount={views.length + 1}>
      <div role="rowgroup">
        <div
          role="row"
          className={`${GRID} hidden border-b-[1.5px] border-ink pb-1.5 text-note text-ink-2 sm:grid`}
        >
          {['Serial', 'Where', 'Heard', 'Clock', 'Supply'].map((head) => (
            <span key={head} role="columnheader">
              {head}
            </span>
          ))}
        </div>
      </div>
      <div role="rowgroup">
        {views.map((view) => (
          <Row key={view.logger.id} view={view} nowMs={nowMs} />
        ))}
      </div>
    </div>
  )
}

function Row({ view, nowMs }: { view: LoggerView; nowMs: number }) {
  const { logger, health, place, matters } = view
  const where = logger.fitted
    ? [logger.fitted.vesselName, logger.fitted.systemName].filter(Boolean).join(', ')
    : PLACE_WORDS[place]
  return (
    <div role="row" className={`${GRID} border-b border-line py-2.5`}>
      <div role="cell" className="col-span-2 sm:col-span-1">
        <Link
          href={`/loggers/${logger.id}`}
          prefetch={false}
          className="inline-flex min-h-11 items-center font-bold break-all text-ink no-underline hover:underline"
        >
          {logger.serial}
        </Link>
      </div>
      <div role="cell" className="col-span-2 sm:col-span-1">
        {where}
        {matters.length > 0 ? (
          <span className="block font-semibold text-attention">{sentence(matters)}</span>
        ) : null}
      </div>
      <div role="cell" className="figure">
        <span className="sm:sr-only">heard </span>
        {logger.lastHeardAt ? span((nowMs - Date.parse(logger.lastHeardAt)) / 1000) : 'never'}
      </div>
      <div role="cell">
        <span className="sm:sr-only">clock </span>
        {logger.clockOffsetSeconds === null ? UNKNOWN : clockWords(logger.clockOffsetSeconds)}
      </div>
      <div role="cell" className="figure">
        <span className="sm:sr-only">supply </span>
        {health?.supplyV == null ? UNKNOWN : `${health.supplyV.toFixed(1)} V`}
      </div>
    </div>
  )
}

const sentence = (matters: readonly string[]): string => {
  const text = matters.join('; ')
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}`
}
