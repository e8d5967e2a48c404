'use client'

import { useForm } from 'react-hook-form'
import { useSWRConfig } from 'swr'
import { ApiProblem, send } from '@/components/data/request'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { Notice } from '@/shared/schemas'

const WEEK_MS = 7 * 86_400_000

/** "I have seen it", with a note for whoever reads it next; or not again before next week. */
export function Acknowledge({ notice }: { notice: Notice }) {
  const { mutate } = useSWRConfig()
  const { register, handleSubmit, formState, setError } = useForm<{ note: string }>({
    defaultValues: { note: '' },
  })
  const attempt = async (work: () => Promise<unknown>) => {
    try {
      await work()
      await mutate((key) => typeof key === 'string' && key.startsWith('/api/notices'))
    } catch (error) {
      setError('root', {
        message: error instanceof ApiProblem ? error.message : 'That did not work. Try again.',
      })
    }
  }
  const submit = handleSubmit(({ note }) =>
    attempt(() => send('POST', `/api/notices/${notice.id}/acknowledge`, note.trim() === '' ? {} : { note })),
  )
  const snooze = () => {
    const snoozedUntil = notice.snoozedUntil === null ? new Date(Date.now() + WEEK_MS).toISOString() : null
    return attempt(() => send('PATCH', `/api/notices/${notice.id}`, { snoozedUntil }))
  }
  return (
    <form onSubmit={(event) => void submit(event)} className="no-print mt-2 lg:mt-0 lg:justify-self-end">
      <div className="flex flex-wrap gap-2">
        {notice.acknowledgedAt === null ? (
          <Button type="submit" weight="quiet" disabled={formState.isSubmitting}>
            I have seen it
          </Button>
        ) : null}
        <Button weight="plain" disabled={formState.isSubmitting} onClick={() => void snooze()}>
          {notice.snoozedUntil === null ? 'Not again this week' : 'Wake it again'}
        </Button>
      </div>
      {notice.acknowledgedAt === null ? (
        <details>
          <summary className="py-1">Add a note</summary>
          <input
            aria-label="A note for whoever reads this next"
            placeholder="For whoever reads this next"
            maxLength={2000}
            className="mt-1 min-h-11 w-full min-w-0 rounded-sm border border-field bg-water px-3 placeholder:text-ink-2"
            {...register('note')}
          />
        </details>
      ) : null}
      {formState.errors.root?.message ? <Trouble title={formState.errors.root.message} /> : null}
    </form>
  )
}
