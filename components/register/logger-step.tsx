'use client'

import { useState } from 'react'
import { send } from '@/components/data/request'
import { CodeForm } from '@/components/register/code-form'
import { KeyShown } from '@/components/register/key-shown'
import { useWork, type Acts } from '@/components/register/use-commissioning'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import { SelectField } from '@/components/ui/select-field'
import type { Channel, Commissioning, Fitted } from '@/shared/schemas'

const CHANNELS: { value: Channel; words: string }[] = [
  { value: 'pump', words: 'Pump on and off' },
  { value: 'vacuum', words: 'Vacuum' },
  { value: 'air', words: 'Air by the tank' },
  { value: 'barometer', words: 'Barometer' },
  { value: 'supply', words: 'Supply voltage' },
]
const RHYTHMS = [15, 30, 60, 120, 300, 900]

type Props = { commissioning: Commissioning; acts: Acts; refresh: () => Promise<unknown>; onward: () => void }

/** Grants the logger its key for the chosen system: fetched by itself, carried by hand, or the one it has. */
export function LoggerStep({ commissioning, acts, refresh, onward }: Props) {
  const [key, setKey] = useState<string | null>(null)
  if (commissioning.fittedAt !== null)
    return (
      <div>
        <p className="text-lead">
          {key !== null
            ? 'The logger is fitted. It needs its key before it can be heard.'
            : commissioning.way === 'claim'
              ? 'Granted. The logger fetches its key at its next poll, within seconds.'
              : 'The logger is fitted.'}
        </p>
        {key !== null ? <KeyShown value={key} serial={commissioning.serial} /> : null}
        <Button className="mt-4" onClick={onward}>
          Go on to the first reading
        </Button>
      </div>
    )
  return <Grant commissioning={commissioning} acts={acts} refresh={refresh} shown={setKey} onward={onward} />
}

function Grant({
  commissioning,
  acts,
  refresh,
  shown,
  onward,
}: Props & { shown: (key: string | null) => void }) {
  const [channels, setChannels] = useState<Channel[]>(['pump', 'vacuum'])
  const [interval, setInterval] = useState('60')
  const { busy, trouble, attempt } = useWork()
  const { system, way, serial } = commissioning
  const toggle = (channel: Channel) =>
    setChannels((now) =>
      now.includes(channel) ? now.filter((other) => other !== channel) : [...now, channel],
    )
  if (system === null) return <p>Choose the boat and its system first.</p>
  const measures = channels.includes('pump') || channels.includes('vacuum')
  const grant = async () => {
    const worked = await attempt(async () => {
      const body = { intervalSeconds: Number(interval), channels }
      const fitted = await send<Fitted>('POST', `/api/commissionings/${commissioning.id}/fitting`, body)
      shown(fitted?.key ?? null)
      await refresh()
    })
    if (worked && way === 'known') onward()
  }
  return (
    <div className="grid max-w-[40em] gap-5">
      <p className="text-lead">
        <strong>{serial}</strong> goes on{' '}
        <strong>{[system.vesselName, system.name].filter(Boolean).join(', ')}</strong>
        {commissioning.userCode ? (
          <>
            , and shows <span className="figure">{commissioning.userCode}</span>
          </>
        ) : null}
        .
      </p>
      {way === 'known' ? (
        <p className="text-ink-2">
          It keeps its key and its rhythm. Where it was, the record up to now stays.
        </p>
      ) : (
        <>
          <fieldset>
            <legend className="mb-1 font-semibold">What it measures</legend>
            <div className="grid gap-x-6 sm:grid-cols-2">
              {CHANNELS.map(({ value, words }) => (
                <label key={value} className="flex min-h-11 items-center gap-3">
                  <input
                    type="checkbox"
                    checked={channels.includes(value)}
                    onChange={() => toggle(value)}
                    className="size-5 accent-act"
                  />
                  {words}
                </label>
              ))}
            </div>
            {measures ? null : <p className="text-attention">Pump or vacuum must be among them.</p>}
          </fieldset>
          <SelectField
            label="It sends a reading every"
            hint="beside every start and stop of the pump; finer while somebody watches"
            value={interval}
            onChange={(event) => setInterval(event.target.value)}
          >
            {RHYTHMS.map((seconds) => (
              <option key={seconds} value={seconds}>
                {seconds < 120 ? `${seconds} s` : `${seconds / 60} min`}
              </option>
            ))}
          </SelectField>
        </>
      )}
      {trouble ? <Trouble title={trouble} /> : null}
      <div>
        <Button disabled={busy || !measures} onClick={() => void grant()}>
          {busy
            ? 'Fitting …'
            : way === 'claim'
              ? 'Grant it its key'
              : way === 'key'
                ? 'Make its key'
                : 'Fit it here'}
        </Button>
      </div>
      {trouble !== null && way === 'claim' ? (
        <div>
          <h3 className="mb-2">If the code ran out</h3>
          <CodeForm word="Take the new code" take={(userCode) => acts.change({ userCode })} />
        </div>
      ) : null}
    </div>
  )
}
