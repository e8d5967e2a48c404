'use client'

import { useState } from 'react'
import { useSWRConfig } from 'swr'
import { ApiProblem, send } from '@/components/data/request'
import { Trouble } from '@/components/ui/sheet-states'
import type { Vessel } from '@/shared/schemas'

type Word = 'aboard' | 'away' | 'as-heard'
const CHOICES: { word: Word; value: boolean | null; label: string }[] = [
  { word: 'aboard', value: true, label: 'Somebody sleeps aboard' },
  { word: 'away', value: false, label: 'Nobody aboard' },
  { word: 'as-heard', value: null, label: 'Tell by the flushes' },
]

/** Who is aboard tonight, by the owner's word; a run wakes only people who are there. */
export function AboardControls({ vessel }: { vessel: Vessel }) {
  const { mutate } = useSWRConfig()
  const [trouble, setTrouble] = useState<string | null>(null)
  const [pending, setPending] = useState<Word | null>(null)
  const said: Word =
    vessel.aboard === null || vessel.aboard.value === 'unknown' ? 'as-heard' : vessel.aboard.value
  const choose = async (word: Word, value: boolean | null) => {
    setPending(word)
    setTrouble(null)
    try {
      await send('PUT', `/api/vessels/${vessel.id}/aboard`, { value })
      await mutate((key) => typeof key === 'string' && /^\/api\/(vessels|systems)\//.test(key))
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    } finally {
      setPending(null)
    }
  }
  return (
    <fieldset disabled={pending !== null}>
      <legend className="text-lead font-[650]">Who is aboard tonight</legend>
      <div className="mt-2 flex flex-wrap gap-2">
        {CHOICES.map(({ word, value, label }) => (
          <label
            key={word}
            className="inline-flex min-h-11 cursor-pointer items-center gap-2 rounded-sm border border-field px-3 has-checked:border-ink has-checked:font-semibold has-checked:inset-shadow-[0_-2px_0_var(--ink)] has-focus-visible:outline-2 has-focus-visible:outline-act"
          >
            <input
              type="radio"
              name={`aboard-${vessel.id}`}
              className="accent-(--act)"
              checked={(pending ?? said) === word}
              onChange={() => void choose(word, value)}
            />
            {label}
          </label>
        ))}
      </div>
      {trouble ? <Trouble title={trouble} /> : null}
    </fieldset>
  )
}
