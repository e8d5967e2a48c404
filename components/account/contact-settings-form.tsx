'use client'

import { z } from 'zod'
import { send } from '@/components/data/request'
import { Choice } from '@/components/joining/choice'
import { EntryForm } from '@/components/joining/entry-form'
import { NOTICE_MEANINGS, NOTICE_WORDS } from '@/components/notices/words'
import { SelectField } from '@/components/ui/select-field'
import { noticeKindSchema, type Contact, type NoticeKind } from '@/shared/schemas'

/** What is told when nothing else was chosen; texts are for what cannot wait for the mail. */
const USUAL: Record<'owner' | 'shop', Record<Contact['channel'], NoticeKind[]>> = {
  owner: {
    email: ['night-warning', 'short-hold', 'short-cycling', 'running-on', 'no-start', 'low-supply', 'freeze'],
    sms: ['night-warning', 'short-cycling', 'running-on', 'no-start', 'low-supply'],
  },
  shop: {
    email: [
      'short-hold',
      'short-cycling',
      'running-on',
      'slow-recharge',
      'switch-drift',
      'step',
      'logger-silent',
      'sensor-fault',
    ],
    sms: ['running-on'],
  },
}

const CHANCES = [
  ['0.2', '1 in 5'],
  ['0.35', '1 in 3'],
  ['0.5', '1 in 2'],
  ['0.7', '2 in 3'],
  ['0.85', '5 in 6'],
] as const

const schema = z.object({
  which: z.enum(['usual', 'chosen']),
  kinds: z.array(noticeKindSchema),
  urgentAtNight: z.boolean(),
  chance: z.string(),
})

/** Which notices come by this address, whether urgent ones do at night, and from what chance a night is warned of. */
export function ContactSettingsForm({
  contact,
  isOwner,
  isShop,
  changed,
}: {
  contact: Contact
  isOwner: boolean
  isShop: boolean
  changed: () => void
}) {
  const { settings, channel } = contact
  const usual = [
    ...new Set([...(isOwner ? USUAL.owner[channel] : []), ...(isShop ? USUAL.shop[channel] : [])]),
  ]
  const nearest = CHANCES.reduce((best, chance) => {
    const wanted = settings.nightWarningChance ?? 0.5
    return Math.abs(Number(chance[0]) - wanted) < Math.abs(Number(best[0]) - wanted) ? chance : best
  })
  return (
    <EntryForm
      schema={schema}
      defaults={{
        which: settings.kinds === undefined ? 'usual' : 'chosen',
        kinds: settings.kinds ?? usual,
        urgentAtNight: settings.urgentAtNight ?? false,
        chance: nearest[0],
      }}
      submit={async ({ which, kinds, urgentAtNight, chance }) => {
        await send('PATCH', `/api/me/contacts/${contact.id}`, {
          settings: {
            ...(which === 'chosen' ? { kinds } : {}),
            urgentAtNight,
            nightWarningChance: Number(chance),
          },
        })
        changed()
      }}
      word="Save"
      busyWord="Saving …"
      doneWord="Saved."
    >
      {({ register, watch }) => (
        <>
          <fieldset className="grid gap-2">
            <legend className="mb-2 font-semibold">What is told here</legend>
            <Choice
              value="usual"
              label="The usual"
              hint={usual.map((kind) => NOTICE_WORDS[kind].toLowerCase()).join(', ') || 'nothing'}
              {...register('which')}
            />
            <Choice value="chosen" label="What I choose" {...register('which')} />
          </fieldset>
          {watch('which') === 'chosen' ? (
            <fieldset className="grid gap-2">
              <legend className="mb-2 font-semibold">Notices</legend>
              {noticeKindSchema.options.map((kind) => (
                <Choice
                  key={kind}
                  type="checkbox"
                  value={kind}
                  label={NOTICE_WORDS[kind]}
                  hint={NOTICE_MEANINGS[kind]}
                  {...register('kinds')}
                />
              ))}
            </fieldset>
          ) : null}
          <Choice
            type="checkbox"
            label="Urgent ones at night too"
            hint="such as a pump that runs on; the others wait for the end of the quiet hours"
            {...register('urgentAtNight')}
          />
          {isOwner ? (
            <SelectField
              label="Warn of a night from a chance of"
              hint="that the pump runs even when somebody flushes last thing"
              {...register('chance')}
            >
              {CHANCES.map(([value, words]) => (
                <option key={value} value={value}>
                  {words}
                </option>
              ))}
            </SelectField>
          ) : null}
        </>
      )}
    </EntryForm>
  )
}
