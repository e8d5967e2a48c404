'use client'

import { useState } from 'react'
import { useFieldArray, useWatch, type UseFormReturn } from 'react-hook-form'
import type { z } from 'zod'
import { Button } from '@/components/ui/button'
import { PartFields } from '@/components/vessel/set-up/part-fields'
import {
  newPart,
  withoutPart,
  type partsFormSchema,
  type PartValues,
} from '@/components/vessel/set-up/part-values'
import { partKindSchema } from '@/shared/schemas'
import type { UnitChoice } from '@/shared/units'

type Values = z.input<typeof partsFormSchema>
export type PartsFormState = UseFormReturn<Values, unknown, z.output<typeof partsFormSchema>>

/** The parts one by one, with a way to add each kind and to take the last removal back. */
export function PartRows({ form, units }: { form: PartsFormState; units: UnitChoice }) {
  const { fields, append, replace } = useFieldArray({ control: form.control, name: 'parts' })
  const parts = useWatch({ control: form.control, name: 'parts' })
  const [removed, setRemoved] = useState<{ name: string; before: PartValues[] } | null>(null)
  const remove = (index: number) => {
    const before = form.getValues('parts')
    const gone = before[index]
    if (gone === undefined) return
    setRemoved({ name: gone.name, before })
    replace(withoutPart(before, gone.key))
  }
  return (
    <>
      {fields.map((field, index) => (
        <PartFields
          key={field.id}
          form={form}
          index={index}
          part={parts[index] ?? field}
          others={parts.filter((part) => part.key !== field.key)}
          units={units}
          remove={() => remove(index)}
        />
      ))}
      <div role="status">
        {removed ? (
          <p className="flex flex-wrap items-center gap-x-3">
            {removed.name || 'The part'} goes when you save.
            <Button
              key={removed.before.length}
              weight="plain"
              // What was pressed is gone: the way back is where the focus belongs.
              autoFocus
              onClick={() => {
                replace(removed.before)
                setRemoved(null)
              }}
            >
              Put it back
            </Button>
          </p>
        ) : null}
      </div>
      <div className="grid gap-2">
        <span className="font-semibold">Add a part</span>
        <div className="flex flex-wrap gap-2">
          {partKindSchema.options.map((kind) => (
            <Button
              key={kind}
              weight="quiet"
              onClick={() => {
                append(newPart(kind, form.getValues('parts')))
                setRemoved(null)
              }}
            >
              {kind.charAt(0).toUpperCase()}
              {kind.slice(1)}
            </Button>
          ))}
        </div>
      </div>
    </>
  )
}
