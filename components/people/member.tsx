'use client'

import { useState } from 'react'
import { ApiProblem, send } from '@/components/data/request'
import { ROLES } from '@/components/people/words'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { Role, ShopPerson } from '@/shared/schemas'

/** One of the shop's people: their roles to tick, and the way out of the shop, asked twice. */
export function Member({
  shopId,
  person,
  isSelf,
  changed,
}: {
  shopId: string
  person: ShopPerson
  isSelf: boolean
  changed: () => void
}) {
  const [roles, setRoles] = useState<readonly Role[]>(person.roles)
  const [state, setState] = useState<'still' | 'busy' | 'asking'>('still')
  const [trouble, setTrouble] = useState<string | null>(null)
  const isChanged = roles.length !== person.roles.length || roles.some((role) => !person.roles.includes(role))
  const save = async (next: readonly Role[]) => {
    setState('busy')
    setTrouble(null)
    try {
      await send('PUT', `/api/shops/${shopId}/people/${person.personId}`, { roles: next })
      changed()
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
    }
    setState('still')
  }
  return (
    <li className="grid gap-x-8 gap-y-3 border-b border-line py-4 lg:grid-cols-[minmax(0,16em)_minmax(0,1fr)_auto] lg:items-center">
      <div>
        <b className="font-semibold">{person.name}</b>
        {isSelf ? <span className="text-ink-2"> (you)</span> : null}
        <span className="datum block break-all">{person.email}</span>
      </div>
      <fieldset disabled={state === 'busy'} className="flex flex-wrap gap-2">
        <legend className="sr-only">Roles of {person.name}</legend>
        {ROLES.map(({ role, word, does }) => (
          <label
            key={role}
            title={does}
            className="inline-flex min-h-11 cursor-pointer items-center gap-2 rounded-sm border border-field px-3 has-checked:border-ink has-checked:font-semibold has-checked:inset-shadow-[0_-2px_0_var(--ink)]"
          >
            <input
              type="checkbox"
              className="accent-(--act)"
              checked={roles.includes(role)}
              onChange={(event) =>
                setRoles(event.target.checked ? [...roles, role] : roles.filter((kept) => kept !== role))
              }
            />
            {word}
          </label>
        ))}
      </fieldset>
      <div className="flex flex-wrap gap-2">
        {isChanged && roles.length > 0 ? (
          <Button disabled={state === 'busy'} onClick={() => void save(roles)}>
            {state === 'busy' ? 'Saving …' : 'Save roles'}
          </Button>
        ) : null}
        {state === 'asking' || (isChanged && roles.length === 0) ? (
          <>
            <Button onClick={() => void save([])}>
              {isSelf ? 'Yes, I leave' : `Yes, take ${person.name} out`}
            </Button>
            <Button
              weight="quiet"
              onClick={() => {
                setRoles(person.roles)
                setState('still')
              }}
            >
              No
            </Button>
          </>
        ) : (
          <Button weight="plain" disabled={state === 'busy'} onClick={() => setState('asking')}>
            {isSelf ? 'Leave the shop' : 'Take out'}
            <span className="sr-only"> {isSelf ? '' : person.name}</span>
          </Button>
        )}
      </div>
      {trouble ? (
        <div className="lg:col-span-3">
          <Trouble title={trouble} />
        </div>
      ) : null}
    </li>
  )
}
