'use client'

import Link from 'next/link'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { StartForm, type Beforehand } from '@/components/register/start-form'
import { nextStep, progressWords, STEP_WORDS, stepHref } from '@/components/register/steps'
import { useWork } from '@/components/register/use-commissioning'
import { send } from '@/components/data/request'
import { ago } from '@/components/time'
import { Button } from '@/components/ui/button'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { Commissioning, List } from '@/shared/schemas'

const PATH = '/api/commissionings?limit=200'

/** Where a registration begins, and where one that was left is taken up again. */
export function RegisterSheet({ beforehand }: { beforehand: Beforehand }) {
  const now = useNow()
  const { data, error, mutate } = useApi<List<Commissioning>>(PATH)
  const open = (data?.items ?? []).filter((item) => item.setAsideAt === null)
  const aside = (data?.items ?? []).filter((item) => item.setAsideAt !== null)
  return (
    <>
      <TitleBlock
        title="Register a logger"
        datum="From the code it shows to a record that proves it. Every step can be left and taken up again, on any device."
      />
      <div className="sheet grid items-start gap-x-16 gap-y-10 lg:grid-cols-[minmax(0,30rem)_minmax(0,1fr)]">
        <section aria-labelledby="begin">
          <h2 id="begin" className="mb-3">
            Begin
          </h2>
          <StartForm beforehand={beforehand} />
        </section>
        <section aria-labelledby="left">
          <h2 id="left" className="mb-1">
            Begun and not signed off
          </h2>
          {error && !data ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
          {!data && !error ? <Loading what="what was begun" /> : null}
          {data && open.length === 0 ? (
            <p className="py-2 text-ink-2">
              Nothing is waiting. What is begun stands here until it is signed off.
            </p>
          ) : null}
          <ul>
            {open.map((item) => (
              <OpenItem key={item.id} item={item} nowMs={now} refresh={() => mutate()} />
            ))}
          </ul>
          {aside.length > 0 ? (
            <details className="mt-5">
              <summary className="min-h-11 py-2">Put aside: {aside.length}</summary>
              <ul>
                {aside.map((item) => (
                  <OpenItem key={item.id} item={item} nowMs={now} refresh={() => mutate()} />
                ))}
              </ul>
            </details>
          ) : null}
        </section>
      </div>
    </>
  )
}

function OpenItem({
  item,
  nowMs,
  refresh,
}: {
  item: Commissioning
  nowMs: number
  refresh: () => Promise<unknown>
}) {
  const { busy, trouble, attempt } = useWork()
  const step = nextStep(item)
  const where = item.system
    ? [item.system.vesselName, item.system.name].filter(Boolean).join(', ')
    : 'no boat chosen yet'
  const put = (setAside: boolean) =>
    attempt(async () => {
      await send('PATCH', `/api/commissionings/${item.id}`, { setAside })
      await refresh()
    })
  return (
    <li className="border-b border-line py-3">
      <div className="flex flex-wrap items-baseline justify-between gap-x-4">
        <Link href={stepHref(item.id, step)} className="inline-flex min-h-11 items-center font-bold">
          {item.serial}: go on with {STEP_WORDS[step].toLowerCase()}
        </Link>
        <Button weight="plain" disabled={busy} onClick={() => void put(item.setAsideAt === null)}>
          {item.setAsideAt === null ? 'Put aside' : 'Take up again'}
        </Button>
      </div>
      <p className="datum">
        {where}. {progressWords(item)}; begun {ago(item.startedAt, nowMs)} by {item.startedBy}.
      </p>
      {trouble ? <Trouble title={trouble} /> : null}
    </li>
  )
}
