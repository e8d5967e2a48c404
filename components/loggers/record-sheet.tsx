'use client'

import Link from 'next/link'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { RecordView } from '@/components/register/record-view'
import { useUnits } from '@/components/shell/units-context'
import { Button, LinkButton } from '@/components/ui/button'
import { Empty, Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { Commissioning } from '@/shared/schemas'

/** The commissioning record of a logger: on screen, on paper, as PDF. */
export function RecordSheet({ loggerId }: { loggerId: string }) {
  const now = useNow()
  const { units } = useUnits()
  const { data, error, mutate } = useApi<Commissioning>(`/api/loggers/${loggerId}/commissioning`)
  const none = error?.status === 404
  return (
    <>
      <TitleBlock
        title="Commissioning record"
        datum={`Vacuum in ${units.vacuum} below ambient. Times of the boat${data?.system ? `, ${data.system.timeZone}` : ''}.`}
      />
      <div className="sheet">
        {error && !none && !data ? <Trouble title={error.message} retry={() => void mutate()} /> : null}
        {none ? (
          <Empty title="This logger was fitted without a commissioning">
            <p className="mb-3">Its checks can be done now: register it again with the key it has.</p>
            <LinkButton href={`/loggers/${loggerId}`} weight="quiet">
              To the logger
            </LinkButton>
          </Empty>
        ) : null}
        {!data && !error ? <Loading what="the record" /> : null}
        {data ? (
          <>
            <RecordView commissioning={data} nowMs={now} />
            <div className="no-print mt-6 flex flex-wrap gap-3">
              <a
                href={`/api/loggers/${loggerId}/commissioning/pdf?units=${units.vacuum}`}
                className="inline-flex min-h-11 items-center rounded-sm bg-act px-4 py-2 font-semibold text-water no-underline"
              >
                Get it as PDF
              </a>
              <Button weight="quiet" onClick={() => window.print()}>
                Print
              </Button>
              {data.finishedAt === null ? (
                <Link href={`/register/${data.id}`} className="inline-flex min-h-11 items-center">
                  Go on with it
                </Link>
              ) : null}
            </div>
          </>
        ) : null}
      </div>
    </>
  )
}
