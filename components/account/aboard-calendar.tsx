'use client'

import { useState } from 'react'
import { z } from 'zod'
import { dateOf, noonOf } from '@/components/account/dates'
import { ApiProblem, send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { useNow } from '@/components/data/use-now'
import { EntryForm } from '@/components/joining/entry-form'
import { Section } from '@/components/joining/section'
import { dayOf } from '@/components/time'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { SelectField } from '@/components/ui/select-field'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { dateSchema, type AboardSpan, type List, type Vessel } from '@/shared/schemas'

const schema = z
  .object({ value: z.enum(['aboard', 'away']), from: dateSchema, until: dateSchema })
  .refine((span) => span.until > span.from, { path: ['until'], message: 'must be later than the first day' })

/** When somebody is aboard one boat: spans of days, added and taken back. */
export function AboardCalendar({ vesselId, name }: { vesselId: string; name: string }) {
  const now = useNow(60_000)
  const path = `/api/vessels/${vesselId}/aboard`
  const { data: vessel } = useApi<Vessel>(`/api/vessels/${vesselId}`)
  const { data, error, mutate } = useApi<List<AboardSpan>>(path)
  const [trouble, setTrouble] = useState<string | null>(null)
  if (error) return <Trouble title={error.message} />
  if (!data || !vessel) return <Loading what={name} />
  const offset = vessel.utcOffsetSeconds
  const takeBack = async (span: AboardSpan) => {
    setTrouble(null)
    try {
      const isNow = Date.parse(span.from) <= now || span.until === null
      await send('PUT', path, { value: null, ...(isNow ? {} : { from: span.from, until: span.until }) })
      await mutate()
    } catch (problem) {
      setTrouble(problem instanceof ApiProblem ? problem.message : 'That did not work. Try again.')
    }
  }
  const today = dateOf(now, offset)
  return (
    <Section title={name} about={`Days as on board, ${vessel.timeZone}, from noon to noon.`}>
      {data.items.length === 0 ? (
        <p className="mb-4 text-ink-2">Nothing is said: flushes tell whether anybody is aboard.</p>
      ) : (
        <ul className="mb-4">
          {data.items.map((span) => (
            <li
              key={span.id}
              className="flex flex-wrap items-center justify-between gap-x-6 border-b border-line py-1"
            >
              <span>
                <b className="font-semibold">
                  {span.value === 'aboard' ? 'Somebody aboard' : 'Nobody aboard'}
                </b>{' '}
                {Date.parse(span.from) <= now ? 'now' : `from ${dayOf(span.from, offset, now)}`}
                {span.until ? ` until ${dayOf(span.until, offset, now)}` : ', until you say otherwise'}
              </span>
              <Button weight="plain" onClick={() => void takeBack(span)}>
                Take back
              </Button>
            </li>
          ))}
        </ul>
      )}
      {trouble ? <Trouble title={trouble} /> : null}
      <EntryForm
        schema={schema}
        defaults={{ value: 'aboard', from: today, until: '' }}
        submit={async ({ value, from, until }) => {
          const start = noonOf(from, offset)
          await send('PUT', path, {
            value: value === 'aboard',
            until: noonOf(until, offset),
            ...(Date.parse(start) > Date.now() ? { from: start } : {}),
          })
          await mutate()
        }}
        word="Add these days"
        busyWord="Adding …"
        doneWord="Added."
        weight="quiet"
      >
        {({ register }, wrong) => (
          <div className="grid gap-4 min-[26rem]:grid-cols-2">
            <div className="min-[26rem]:col-span-2">
              <SelectField label="Who" {...register('value')}>
                <option value="aboard">Somebody sleeps aboard</option>
                <option value="away">Nobody aboard</option>
              </SelectField>
            </div>
            <Field label="From" type="date" min={today} error={wrong('from')} {...register('from')} />
            <Field label="Until" type="date" min={today} error={wrong('until')} {...register('until')} />
          </div>
        )}
      </EntryForm>
    </Section>
  )
}
