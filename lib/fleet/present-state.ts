import { stateSchema, type State, type StatementValue } from '@/shared/schemas'

/**
 * The state now, from the figures last computed: silence and what people say hold by the clock alone, without
 * a new sample. The first that fits, in the order of the states.
 */
export function presentState(known: {
  state: string | null
  since: Date | null
  lastHeardAt: Date | null
  silenceSeconds: number
  statement: { value: StatementValue; from: Date } | null
  now: Date
}): { state: State; since: Date | null } {
  const { lastHeardAt, statement } = known
  const silentFrom = lastHeardAt && new Date(lastHeardAt.getTime() + known.silenceSeconds * 1000)
  if (silentFrom === null) return { state: 'unheard', since: null }
  if (silentFrom < known.now) return { state: 'unheard', since: silentFrom }
  if (statement?.value === 'laid-up' || statement?.value === 'worked-on')
    return { state: statement.value, since: statement.from }
  const derived = stateSchema.safeParse(known.state)
  const state = derived.success ? derived.data : 'learning'
  if (statement?.value === 'off' && state !== 'running-on') return { state: 'off', since: statement.from }
  // Taken back, or heard again, since the figures were computed: until the next sample nothing better is known.
  if (state === 'unheard' || state === 'laid-up' || state === 'worked-on')
    return { state: 'learning', since: null }
  return { state, since: known.since }
}
