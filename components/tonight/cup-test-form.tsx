'use client'

import { useForm, useWatch } from 'react-hook-form'
import { ApiProblem, send } from '@/components/data/request'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Trouble } from '@/components/ui/sheet-states'
import type { StartCupTest, System } from '@/shared/schemas'

/** No part's key: keys hold no asterisk. */
const OTHER = '*'
const CHIP =
  'flex min-h-11 cursor-pointer items-center gap-2 rounded-sm border border-field px-3 has-checked:border-ink has-checked:font-semibold has-checked:inset-shadow-[0_-2px_0_var(--ink)] has-focus-visible:outline-2 has-focus-visible:outline-act'

/** Which bowl the water is in; the server keeps the instant. */
export function CupTestForm({ system, changed }: { system: System; changed: () => void }) {
  const heads = system.parts.filter((part) => part.kind === 'head')
  const { register, handleSubmit, formState, setError, reset, control } = useForm({
    defaultValues: { bowl: heads[0]?.key ?? OTHER, name: '' },
  })
  const bowl = useWatch({ control, name: 'bowl' })
  const submit = handleSubmit(async (said) => {
    const body: StartCupTest = said.bowl === OTHER ? { name: said.name } : { partKey: said.bowl }
    try {
      await send('POST', `/api/systems/${system.id}/cup-tests`, body)
      reset()
      changed()
    } catch (error) {
      const message = error instanceof ApiProblem ? error.message : 'That did not work. Try again.'
      setError('root', { message })
    }
  })
  return (
    <form onSubmit={(event) => void submit(event)} className="mt-4 grid gap-3">
      {heads.length > 0 ? (
        <fieldset>
          <legend className="font-semibold">The bowl with the water</legend>
          <div className="mt-2 flex flex-wrap gap-2">
            {[...heads, { key: OTHER, name: 'Another bowl' }].map((head) => (
              <label key={head.key} className={CHIP}>
                <input type="radio" value={head.key} className="accent-(--act)" {...register('bowl')} />
                {head.name}
              </label>
            ))}
          </div>
        </fieldset>
      ) : null}
      {bowl === OTHER ? (
        <Field
          label="What you call that bowl"
          maxLength={120}
          autoComplete="off"
          error={formState.errors.name?.message ?? ''}
          {...register('name', {
            validate: (name, { bowl: chosen }) =>
              chosen !== OTHER || name.trim() !== '' || 'Say which bowl, for example “forward”.',
          })}
        />
      ) : null}
      <Button
        type="submit"
        className="w-full sm:w-auto sm:justify-self-start"
        disabled={formState.isSubmitting}
      >
        {formState.isSubmitting ? 'Noting the time …' : 'The water is in'}
      </Button>
      {formState.errors.root?.message ? <Trouble title={formState.errors.root.message} /> : null}
    </form>
  )
}
