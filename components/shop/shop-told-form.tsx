'use client'

import { z } from 'zod'
import { send } from '@/components/data/request'
import { Choice } from '@/components/joining/choice'
import { EntryForm } from '@/components/joining/entry-form'
import { NOTICE_MEANINGS, NOTICE_WORDS } from '@/components/notices/words'
import { Field } from '@/components/ui/field'
import { SelectField } from '@/components/ui/select-field'
import {
  noticeKindSchema,
  wallTimeSchema,
  type NoticeKind,
  type ShopPerson,
  type ShopWhole,
} from '@/shared/schemas'

/** Told to a shop when it chose nothing else. */
const USUAL: readonly NoticeKind[] = [
  'short-hold',
  'short-cycling',
  'running-on',
  'slow-recharge',
  'switch-drift',
  'step',
  'logger-silent',
  'sensor-fault',
]
const schema = z.object({
  kinds: z.array(noticeKindSchema),
  start: wallTimeSchema,
  end: wallTimeSchema,
  onCallId: z.string(),
})

/** Which notices go to the shop, its quiet hours, and who is called when nobody takes something urgent up. */
export function ShopToldForm({
  shop,
  people,
  changed,
}: {
  shop: ShopWhole
  people: readonly ShopPerson[]
  changed: () => void
}) {
  return (
    <EntryForm
      schema={schema}
      defaults={{
        kinds: shop.toldKinds ?? [...USUAL],
        ...shop.quietHours,
        onCallId: shop.onCall?.personId ?? '',
      }}
      submit={async ({ kinds, start, end, onCallId }) => {
        await send('PATCH', `/api/shops/${shop.id}`, {
          toldKinds: kinds,
          quietHours: { start, end },
          onCallId: onCallId || null,
        })
        changed()
      }}
      word="Save"
      busyWord="Saving …"
      doneWord="Saved."
    >
      {({ register }, wrong) => (
        <>
          <fieldset>
            <legend className="mb-2 font-semibold">Notices</legend>
            <div className="grid gap-2">
              {USUAL.map((kind) => (
                <Choice
                  key={kind}
                  type="checkbox"
                  value={kind}
                  label={NOTICE_WORDS[kind]}
                  hint={NOTICE_MEANINGS[kind]}
                  {...register('kinds')}
                />
              ))}
            </div>
          </fieldset>
          <div className="grid grid-cols-2 gap-4">
            <Field label="Quiet from" type="time" error={wrong('start')} {...register('start')} />
            <Field label="until" type="time" error={wrong('end')} {...register('end')} />
          </div>
          <SelectField
            label="On call"
            hint="told of urgent notices that nobody took up"
            {...register('onCallId')}
          >
            <option value="">Every manager, and who agreed to night calls</option>
            {people.map((person) => (
              <option key={person.personId} value={person.personId}>
                {person.name}
              </option>
            ))}
          </SelectField>
        </>
      )}
    </EntryForm>
  )
}
