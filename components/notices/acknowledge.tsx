'use client'

import { useForm } from 'react-hook-form'
import { useSWRConfig } from 'swr'
import { ApiProblem, send } from '@/components/data/request'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { Notice } from '@/shared/schemas'

const DAY_MS = 86_400_000

/** "I have seen it", with a note for whoever reads it next; or not before next week. */
export function Acknowledge({ notice }: { notice: Notice }) {
  const { mutate } = useSWRConfig()
  const { register, handleSubmit, formState, setError } = useForm<{ note: string }>({
    defaultValues: { note: '' },
  })
  const fresh = () => mutate((key) => typeof key === 'string' && key.startsWith('/api/notices'))
  const attempt = async (work: () => Promise<unknown>) => {
    try {
      await work()
      await fresh()
    } catch (error) {
      setError('root', {
        message: error instanceof ApiProblem ? error.message : 'That did not work. Try again.',
      })
    }
  }
  const submit = handleSubmit(({ note }) =>
    attempt(() => send('POST', `/api/notices/${notice.id}/acknowledge`, note.trim() === '' ? {} : { note })),
  )
  const snooze = (snoozedUntil: string | null) =>
    attempt(() => send('PATCH', `/api/notices/${notice.id}`, { snoozedUntil }))
  return (
    <form onSubmit={(event) => void submit(event)} className="no-print mt-3 grid gap-2">
      {notice.acknowledgedAt === null ? (
        <div className="flex flex-wrap gap-2">
          <input
            aria-label="A note for whoever reads this next"
            placeholder="A note for whoever reads this next"
            maxLength={2000}
            className="min-h-11 min-w-0 flex-1 basis-64 rounded-sm border border-field bg-water px-3 placeholder:text-ink-2 sm:max-w-[26em]"
            {...register('note')}
          />
          <Button type="submit" disabled={formState.isSubmitting}>
            I have seen it
          </Button>
          <SnoozeButton notice={notice} snooze={snooze} />
        </div>
      ) : (
        <div>
          <SnoozeButton notice={notice} snooze={snooze} />
        </div>
      )}
      {formState.errors.root?.message ? <Trouble title={formState.errors.root.message} /> : null}
    </form>
  )
}

function SnoozeButton({
  notice,
  snooze,
}: {
  notice: Notice
  snooze: (until: string | null) => Promise<void>
}) {
  return notice.snoozedUntil === null ? (
    <Button weight="quiet" onClick={() => void snooze(new Date(Date.now() + 7 * DAY_MS).toISOString())}>
      Not again this week
    </Button>
  ) : (
    <Button weight="quiet" onClick={() => void snooze(null)}>
      Wake it again
    </Button>
  )
}
