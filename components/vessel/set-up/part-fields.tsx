'use client'

import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { SelectField } from '@/components/ui/select-field'
import { partValuesSchema, saidVolumeM3, type PartValues } from '@/components/vessel/set-up/part-values'
import type { PartsFormState } from '@/components/vessel/set-up/part-rows'
import { MEASURES, SHAPE_WORDS, sizeUnit, type Shape } from '@/components/vessel/set-up/volumes'
import { partKindSchema } from '@/shared/schemas'
import { formatVolume, type UnitChoice } from '@/shared/units'

const UNIT_WORDS = { L: 'L', usGal: 'US gal', impGal: 'imp gal' }
const SHAPES_OF = (kind: PartValues['kind']): Shape[] =>
  kind === 'hose' ? ['typed', 'hose'] : ['typed', 'cylinder', 'box']

/** One part: what it is, what it is called, where it leads, and its gas volume typed or from its sizes. */
export function PartFields({
  form,
  index,
  part,
  others,
  units,
  remove,
}: {
  form: PartsFormState
  index: number
  /** What is entered of it now. */
  part: PartValues
  others: readonly PartValues[]
  units: UnitChoice
  remove: () => void
}) {
  const { register, getFieldState, formState, setValue } = form
  const wrong = (
    name: `parts.${number}.name` | `parts.${number}.volume` | `parts.${number}.sizes.${number}`,
  ): string | undefined => {
    const message = getFieldState(name, formState).error?.message
    return message === undefined ? undefined : `${message.charAt(0).toUpperCase()}${message.slice(1)}.`
  }
  const kind = register(`parts.${index}.kind`)
  const checked = partValuesSchema.safeParse(part)
  const { shape } = part
  const worked = shape !== 'typed' && checked.success ? saidVolumeM3(checked.data, part.volume, units) : null
  return (
    <fieldset className="grid gap-3 border-b border-line pb-5">
      <legend className="mb-2 font-semibold">{part.name || 'Unnamed part'}</legend>
      <div className="grid gap-3 sm:grid-cols-2">
        <Field label="Name" error={wrong(`parts.${index}.name`)} {...register(`parts.${index}.name`)} />
        <SelectField
          label="Kind"
          {...kind}
          onChange={(event) => {
            void kind.onChange(event)
            // Sizes of the other kind's shape would be read as this one's.
            setValue(`parts.${index}.shape`, 'typed')
          }}
        >
          {partKindSchema.options.map((option) => (
            <option key={option} value={option}>
              {option}
            </option>
          ))}
        </SelectField>
        <SelectField
          label="Leads to"
          hint="the next part towards the tank"
          {...register(`parts.${index}.parent`)}
        >
          <option value="">nothing further</option>
          {others.map((other) => (
            <option key={other.key} value={other.key}>
              {other.name || other.key}
            </option>
          ))}
        </SelectField>
        <SelectField label="Gas volume" hint="what air can fill" {...register(`parts.${index}.shape`)}>
          {SHAPES_OF(part.kind).map((option) => (
            <option key={option} value={option}>
              {SHAPE_WORDS[option]}
            </option>
          ))}
        </SelectField>
      </div>
      {shape === 'typed' ? (
        <Field
          label={`Volume, ${UNIT_WORDS[units.volume]}`}
          hint="empty if not known"
          inputMode="decimal"
          error={wrong(`parts.${index}.volume`)}
          {...register(`parts.${index}.volume`)}
        />
      ) : (
        <>
          <div className="grid gap-3 min-[26rem]:grid-cols-2">
            {MEASURES[shape].map((name, place) => (
              <Field
                key={name}
                label={`${name}, ${sizeUnit(shape, place, units.volume).name}`}
                inputMode="decimal"
                error={wrong(`parts.${index}.sizes.${place}`)}
                {...register(`parts.${index}.sizes.${place}`)}
              />
            ))}
          </div>
          <output className="figure">
            {worked === null ? 'Volume: sizes are missing' : `Volume: ${formatVolume(worked, units.volume)}`}
          </output>
        </>
      )}
      <div>
        <Button weight="plain" className="-ml-4" onClick={remove}>
          Remove {part.name || 'this part'}
        </Button>
      </div>
    </fieldset>
  )
}
