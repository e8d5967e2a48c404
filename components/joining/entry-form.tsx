'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState, type ReactNode } from 'react'
import { useForm, type DefaultValues, type FieldValues, type Path, type UseFormReturn } from 'react-hook-form'
import type { z } from 'zod'
import { ApiProblem } from '@/components/data/request'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'

/** Says of the fields what the server said of them, and the rest above the button. */
function showProblem<Values extends FieldValues>(form: UseFormReturn<Values>, error: unknown): void {
  if (!(error instanceof ApiProblem)) {
    form.setError('root', { message: 'That did not work. Try again; what you typed is kept.' })
    return
  }
  const known = Object.keys(form.getValues())
  const [first] = error.errors.filter((entry) => known.includes(entry.path))
  for (const entry of error.errors)
    if (known.includes(entry.path))
      form.setError(entry.path as Path<Values>, { message: sentence(entry.message) }) // a key just found among the values
  if (first === undefined || error.errors.length === 0) form.setError('root', { message: error.message })
  else form.setFocus(first.path as Path<Values>) // the same
}

/** "is missing" is said of a field whose name stands above it. */
const sentence = (message: string): string => `${message.charAt(0).toUpperCase()}${message.slice(1)}.`

/**
 * A form of a few fields: checked by the schema that the server uses, keeps what was typed when something is wrong,
 * and says in words what happened.
 */
export function EntryForm<Schema extends z.ZodType<FieldValues, FieldValues>>({
  schema,
  defaults,
  submit,
  word,
  busyWord,
  doneWord,
  clears = false,
  weight = 'full',
  children,
}: {
  schema: Schema
  defaults: DefaultValues<z.input<Schema>>
  submit: (values: z.output<Schema>) => Promise<unknown>
  word: string
  busyWord: string
  /** Said when it is done and the form stays. */
  doneWord?: string
  /** Empties the fields once they were taken. */
  clears?: boolean
  weight?: 'full' | 'quiet'
  children: (
    form: UseFormReturn<z.input<Schema>, unknown, z.output<Schema>>,
    wrong: (name: Path<z.input<Schema>>) => string | undefined,
  ) => ReactNode
}) {
  const [done, setDone] = useState(false)
  const form = useForm<z.input<Schema>, unknown, z.output<Schema>>({
    resolver: zodResolver(schema),
    defaultValues: defaults,
  })
  const { errors, isSubmitting } = form.formState
  const wrong = (name: Path<z.input<Schema>>): string | undefined => {
    const message = form.getFieldState(name, form.formState).error?.message
    return message === undefined || /^[A-Z]/.test(message) ? message : sentence(message)
  }
  const send = form.handleSubmit(async (values) => {
    setDone(false)
    try {
      await submit(values)
      setDone(true)
      if (clears) form.reset(defaults)
    } catch (error) {
      showProblem(form as unknown as UseFormReturn<FieldValues>, error) // it reads names and sets messages alone
    }
  })
  return (
    <form method="post" noValidate onSubmit={(event) => void send(event)} className="grid max-w-[28em] gap-4">
      {children(form, wrong)}
      {errors.root?.message ? <Trouble title={errors.root.message} /> : null}
      <div className="flex flex-wrap items-center gap-4">
        <Button type="submit" weight={weight} disabled={isSubmitting} className="w-full sm:w-auto">
          {isSubmitting ? busyWord : word}
        </Button>
        <span role="status" className="text-ink-2">
          {done && !isSubmitting ? (doneWord ?? '') : ''}
        </span>
      </div>
    </form>
  )
}
