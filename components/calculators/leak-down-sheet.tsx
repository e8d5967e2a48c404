'use client'

import { useEffect, useRef } from 'react'
import { useForm, useWatch } from 'react-hook-form'
import { AlignmentChart } from '@/components/calculators/alignment-chart'
import { HoldTable } from '@/components/calculators/hold-table'
import { convertFields, exampleFields, readingsOf, type Resolutions } from '@/components/calculators/readings'
import { ReadingFields } from '@/components/calculators/reading-fields'
import { useKeepOffline } from '@/components/calculators/use-keep-offline'
import { verdictBasis, verdictSentence, verdictState, type Judge } from '@/components/calculators/verdict'
import { useUnits } from '@/components/shell/units-context'
import { Finding } from '@/components/tonight/finding'
import { Button } from '@/components/ui/button'
import { Caution } from '@/components/ui/sheet-states'
import { StateMark } from '@/components/ui/state-mark'
import { TitleBlock } from '@/components/ui/title-block'
import { fromPa } from '@/shared/units'

/** Two gauge readings and a watch: verdict, hold time and leak as they are typed. Nothing leaves the page. */
export function LeakDownSheet({ judge, resolutions }: { judge: Judge; resolutions: Resolutions }) {
  const { units } = useUnits()
  const { register, control, getValues, reset } = useForm({ defaultValues: exampleFields(units) })
  const fields = { ...exampleFields(units), ...useWatch({ control }) }
  const typedIn = useRef(units)
  useKeepOffline()
  useEffect(() => {
    if (typedIn.current === units) return
    reset(convertFields(getValues(), typedIn.current, units))
    typedIn.current = units
  }, [units, getValues, reset])
  const { readings, troubles } = readingsOf(fields, units, resolutions)
  const answer = readings && judge(readings)
  const rate = answer && (answer.compensatedPaPerHour ?? answer.paPerHour)
  const reading =
    readings && rate !== null
      ? { minutes: readings.seconds / 60, lossPa: (rate * readings.seconds) / 3600 }
      : null
  const differentialPa = readings?.differentialPa ?? 6095.5
  return (
    <>
      <TitleBlock
        title="Leak-down"
        datum={`Two gauge readings and a watch. Vacuum in ${units.vacuum} below ambient; ${fromPa(differentialPa, units.vacuum).toPrecision(2)} ${units.vacuum} between the pump’s stop and start.`}
        aside={['Works without a connection', 'Nothing you type leaves this page']}
      />
      <div className="sheet grid gap-x-16 gap-y-10 lg:grid-cols-[minmax(0,27rem)_minmax(0,1fr)]">
        <div className="no-print">
          <ReadingFields units={units} register={register} troubles={troubles} />
          <div aria-live="polite" className="mt-6">
            {answer && readings ? (
              <>
                <p className="text-finding tracking-[-0.015em]">
                  <span className="mr-2 inline-flex">
                    <StateMark state={verdictState(answer.verdict)} size={24} />
                  </span>
                  <Finding phrases={verdictSentence(answer, readings)} />
                </p>
                <p className="mt-2 text-ink-2">{verdictBasis(answer, readings, units)}</p>
              </>
            ) : (
              <p className="text-lead">Fill in what is marked, and the verdict stands here.</p>
            )}
          </div>
          <div className="mt-6">
            <Caution>
              Before the test: water off, everybody aboard told. Draw down, then switch the pump off at its
              own breaker, never one that feeds a bilge pump: losing vacuum starts the pump, and it spoils the
              test.
            </Caution>
          </div>
        </div>
        <div>
          <AlignmentChart differentialPa={differentialPa} unit={units.vacuum} reading={reading} />
          <p className="mt-3 max-w-[46em] text-ink-2">
            Printed, it needs no battery: lay a straight edge from the minutes waited to the vacuum lost and
            read the hours between.
          </p>
          <Button weight="quiet" className="no-print mt-3" onClick={() => window.print()}>
            Print chart and table
          </Button>
          <div className="mt-10">
            <HoldTable differentialPa={differentialPa} unit={units.vacuum} />
          </div>
        </div>
      </div>
    </>
  )
}
