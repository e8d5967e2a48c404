'use client'

import { useForm } from 'react-hook-form'
import { numberOf } from '@/components/calculators/readings'
import { send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import { useWork } from '@/components/register/use-commissioning'
import { useUnits } from '@/components/shell/units-context'
import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { SelectField } from '@/components/ui/select-field'
import type { CreateVessel, Me } from '@/shared/schemas'
import { fromPa, inHgToPa, toPa } from '@/shared/units'

interface Fields {
  name: string
  timeZone: string
  berth: string
  ownerEmail: string
  shopId: string
  kind: string
  cutOut: string
  cutIn: string
}

const KINDS = [
  ['pass-through', 'Pass-through: waste goes through to the pump'],
  ['collecting', 'Collecting: waste stays in the tank under vacuum'],
  ['unit', 'Pump and tank in one unit'],
  ['two-pumps', 'Two pumps or tanks'],
  ['on-demand', 'On demand: no standing vacuum'],
] as const

/** A new boat with its first system; without an owner's address the shop keeps it until one accepts. */
export function NewBoatForm({
  made,
  cancel,
  cancelWord = 'Pick one instead',
}: {
  made: (systemId: string) => Promise<void>
  cancel: () => void
  cancelWord?: string
}) {
  const { data: me, error } = useApi<Me>('/api/me')
  if (error) return <Trouble title={error.message} />
  if (!me) return <Loading what="your shop" />
  return <Form me={me} made={made} cancel={cancel} cancelWord={cancelWord} />
}

function Form({
  me,
  made,
  cancel,
  cancelWord,
}: {
  me: Me
  made: (systemId: string) => Promise<void>
  cancel: () => void
  cancelWord: string
}) {
  const { units } = useUnits()
  const usual = (inHg: number) => String(Number(fromPa(inHgToPa(inHg), units.vacuum).toPrecision(3)))
  const shops = me.shops.filter((shop) => shop.roles.some((role) => role !== 'technician'))
  const { busy, trouble, attempt } = useWork()
  const { register, handleSubmit, formState, setError } = useForm<Fields>({
    defaultValues: {
      name: '',
      timeZone: shops[0]?.timeZone ?? Intl.DateTimeFormat().resolvedOptions().timeZone,
      berth: '',
      ownerEmail: '',
      shopId: shops[0]?.id ?? '',
      kind: 'pass-through',
      cutOut: usual(10),
      cutIn: usual(8.2),
    },
  })
  const submit = handleSubmit(async (fields) => {
    const [cutOut, cutIn] = [numberOf(fields.cutOut), numberOf(fields.cutIn)]
    if (cutOut === null || cutOut <= 0) return setError('cutOut', { message: 'Write a number.' })
    if (cutIn === null || cutIn <= 0) return setError('cutIn', { message: 'Write a number.' })
    if (cutIn >= cutOut)
      return setError('cutIn', { message: 'The pump starts at less vacuum than it stops at.' })
    const kind = KINDS.find(([value]) => value === fields.kind)?.[0]
    const vessel: CreateVessel = {
      name: fields.name,
      timeZone: fields.timeZone,
      ...(fields.berth.trim() === '' ? {} : { berth: fields.berth }),
      ...(fields.ownerEmail.trim() === '' ? {} : { ownerEmail: fields.ownerEmail.trim() }),
      ...(fields.shopId === '' ? { ownerEmail: me.person.email } : { shopId: fields.shopId }),
      system: { kind, cutOutPa: toPa(cutOut, units.vacuum), cutInPa: toPa(cutIn, units.vacuum) },
    }
    await attempt(async () => {
      const answer = await send<{ id: string; systems: { id: string }[] }>('POST', '/api/vessels', vessel)
      const systemId = answer?.systems[0]?.id
      if (systemId !== undefined) await made(systemId)
    })
  })
  const needed = { required: 'This is needed.' }
  return (
    <form
      onSubmit={(event) => void submit(event)}
      noValidate
      className="grid max-w-[40em] gap-4 sm:grid-cols-2"
    >
      <h2 className="sm:col-span-2">A new boat</h2>
      <Field
        label="Name of the boat"
        maxLength={120}
        error={formState.errors.name?.message}
        {...register('name', needed)}
      />
      <Field label="Berth" hint="optional" maxLength={120} {...register('berth')} />
      <Field
        label="Time zone"
        hint="of her home port, such as America/New_York; quiet hours follow it"
        spellCheck={false}
        error={formState.errors.timeZone?.message}
        {...register('timeZone', needed)}
      />
      {shops.length > 0 ? (
        <Field
          label="Owner’s e-mail"
          hint="optional; until one accepts, the shop keeps the boat"
          type="email"
          {...register('ownerEmail')}
        />
      ) : null}
      {shops.length > 1 ? (
        <SelectField label="Shop" {...register('shopId')}>
          {shops.map((shop) => (
            <option key={shop.id} value={shop.id}>
              {shop.name}
            </option>
          ))}
        </SelectField>
      ) : null}
      <h3 className="mt-2 sm:col-span-2">Its vacuum system</h3>
      <div className="sm:col-span-2">
        <SelectField label="Kind" {...register('kind')}>
          {KINDS.map(([value, words]) => (
            <option key={value} value={value}>
              {words}
            </option>
          ))}
        </SelectField>
      </div>
      <Field
        label={`Pump stops at, ${units.vacuum}`}
        inputMode="decimal"
        hint="the cut-out; learned within a day"
        error={formState.errors.cutOut?.message}
        {...register('cutOut')}
      />
      <Field
        label={`Pump starts at, ${units.vacuum}`}
        inputMode="decimal"
        hint="the cut-in"
        error={formState.errors.cutIn?.message}
        {...register('cutIn')}
      />
      {trouble ? (
        <div className="sm:col-span-2">
          <Trouble title={trouble} />
        </div>
      ) : null}
      <div className="flex flex-wrap gap-3 sm:col-span-2">
        <Button type="submit" disabled={busy}>
          {busy ? 'Setting up …' : 'Set up the boat'}
        </Button>
        <Button weight="quiet" onClick={cancel}>
          {cancelWord}
        </Button>
      </div>
    </form>
  )
}
