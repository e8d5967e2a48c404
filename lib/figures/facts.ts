import type { StoredFacts } from '@/db/queries/facts'
import { orderItems } from '@/lib/analysis/fold/order'
import type {
  Fact,
  FoldItem,
  FoldSettings,
  Instant,
  StatementValue,
  SystemKind,
} from '@/lib/analysis/fold/types'

/** Before every sample: the figures first told of a system stand for all that was measured before them too. */
const BEGINNING: Instant = 0

const KINDS: readonly SystemKind[] = ['pass-through', 'collecting', 'unit', 'two-pumps', 'on-demand']
const VALUES: readonly StatementValue[] = ['off', 'laid-up', 'worked-on']

/** Samples are whole milliseconds, so a fact within a millisecond comes before the next sample. */
const instantOf = (ms: number): Instant => Math.max(BEGINNING, Math.ceil(ms))

/** The stored set-up as facts of the fold, in its order. */
export function factItems(stored: StoredFacts): (FoldItem & { type: 'fact' })[] {
  const facts: Fact[] = [
    ...stored.settings.map((row, position): Fact => ({
      kind: 'settings',
      at: position === 0 ? BEGINNING : instantOf(row.fromMs),
      settings: settingsOf(row),
    })),
    ...stored.fittings.flatMap((row): Fact[] => {
      const { loggerId, intervalSeconds } = row
      const channels = { pump: row.channels.includes('pump'), vacuum: row.channels.includes('vacuum') }
      const fitted: Fact = { kind: 'fitting', at: instantOf(row.fromMs), loggerId, intervalSeconds, channels }
      return row.toMs === Infinity
        ? [fitted]
        : [fitted, { kind: 'removal', at: instantOf(row.toMs), loggerId }]
    }),
    ...statementFacts(stored.statements),
  ]
  return orderItems(facts, []).filter((item): item is FoldItem & { type: 'fact' } => item.type === 'fact')
}

function settingsOf(row: StoredFacts['settings'][number]): FoldSettings {
  const kind = KINDS.find((known) => known === row.kind) ?? 'pass-through'
  return { kind, cutOutPa: row.cutOutPa, cutInPa: row.cutInPa }
}

/**
 * What people said, as changes of what is in force: of the statements that hold at an instant the one said to begin
 * last counts. One that ends brings back an older one that still holds, else `null`.
 */
function statementFacts(statements: StoredFacts['statements']): Fact[] {
  const spans = statements.map((row) => ({
    from: instantOf(row.fromMs),
    to: row.toMs === Infinity ? Infinity : instantOf(row.toMs),
    value: VALUES.find((known) => known === row.value) ?? null,
    id: Number(row.id),
  }))
  const times = [...new Set(spans.flatMap(({ from, to }) => [from, to]))]
    .filter((time) => time !== Infinity)
    .sort((a, b) => a - b)
  const facts: Fact[] = []
  let before: StatementValue | null = null
  for (const at of times) {
    const [newest] = spans
      .filter(({ from, to }) => from <= at && at < to)
      .sort((a, b) => b.from - a.from || b.id - a.id)
    const value = newest?.value ?? null
    if (value !== before) facts.push({ kind: 'statement', at, value })
    before = value
  }
  return facts
}

/** What people say of the system, in force at `at`. */
export function statementAt(
  stored: StoredFacts,
  at: Instant,
): { value: StatementValue; since: Instant } | null {
  const last = statementFacts(stored.statements)
    .filter((fact) => fact.at <= at)
    .at(-1)
  return last?.kind === 'statement' && last.value !== null ? { value: last.value, since: last.at } : null
}
