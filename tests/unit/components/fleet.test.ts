import { describe, expect, it } from 'vitest'
import { fleetFinding } from '@/components/fleet/finding'
import { holdWords } from '@/components/figures'
import { movingWords, tonightWords } from '@/components/fleet/fleet-words'
import { sortRows, SORTS } from '@/components/fleet/order'
import { countStates, filterRows, harboursOf, parseView, viewQuery } from '@/components/fleet/view-state'
import { stateSchema } from '@/shared/schemas'
import { hold, NOW, row } from './fixtures'

const named = (rows: readonly { name: string }[]) => rows.map((entry) => entry.name)

describe('the order of the fleet', () => {
  const rows = [
    row({ name: 'Quillon', state: 'tight', holdTime: hold(21) }),
    row({ name: 'Hare', state: 'leaking', holdTime: hold(1.4) }),
    row({ name: 'Ashore', state: 'short-cycling', holdTime: hold(0.1) }),
    row({ name: 'Newcomer', state: 'learning', holdTime: null }),
    row({ name: 'Finch', state: 'weeping', holdTime: hold(6) }),
  ]
  it('is worst first', () => {
    expect(named(sortRows(rows, 'worst'))).toEqual(['Ashore', 'Hare', 'Finch', 'Newcomer', 'Quillon'])
  })
  it('puts a boat with people aboard before one as bad that wakes nobody', () => {
    const aboard = rows.map((entry) => ({
      ...entry,
      aboard: entry.name === 'Hare' ? ('aboard' as const) : null,
    }))
    expect(named(sortRows(aboard, 'worst')).slice(0, 2)).toEqual(['Hare', 'Ashore'])
  })
  it('has a place for boats without a hold time, and leaves its input alone', () => {
    const frozen = Object.freeze([...rows])
    expect(named(sortRows(frozen, 'hold'))).toEqual(['Ashore', 'Hare', 'Finch', 'Quillon', 'Newcomer'])
    expect(named(sortRows(frozen, 'name'))[0]).toBe('Ashore')
  })
  it('is the same whatever order the boats came in', () => {
    const many = Array.from({ length: 200 }, (_, index) =>
      row({
        name: `Boat ${index}`,
        state: stateSchema.options[index % 10] ?? 'tight',
        holdTime: hold((index * 7) % 40),
      }),
    )
    for (const sort of SORTS)
      expect(named(sortRows([...many].reverse(), sort))).toEqual(named(sortRows(many, sort)))
  })
})

describe('the view in the address', () => {
  it('comes back as it went', () => {
    const view = {
      find: 'b 07',
      states: ['leaking' as const, 'weeping' as const],
      harbour: 'Port Averill',
      sort: 'name' as const,
    }
    expect(parseView(new URLSearchParams(viewQuery(view)))).toEqual(view)
  })
  it('leaves out what it does not understand, and is empty for the plain view', () => {
    const view = parseView(new URLSearchParams('state=leaking,drowned&sort=colour'))
    expect(view).toEqual({ find: '', states: ['leaking'], harbour: '', sort: 'worst' })
    expect(viewQuery({ find: ' ', states: [], harbour: '', sort: 'worst' })).toBe('')
  })
  it('finds by every word, without accents or case', () => {
    const rows = [row({ name: 'Çapa Gülü', berth: 'B 07' }), row({ name: 'Capability', berth: 'C 01' })]
    const find = (text: string) =>
      named(filterRows(rows, { find: text, states: [], harbour: '', sort: 'worst' }))
    expect(find('capa b')).toEqual(['Çapa Gülü', 'Capability'])
    expect(find('gulu 07')).toEqual(['Çapa Gülü'])
  })
  it('counts states in their order and lists harbours once', () => {
    const rows = [
      row({ state: 'tight' }),
      row({ state: 'leaking', harbour: 'Cold Haven' }),
      row({ state: 'tight' }),
    ]
    expect(countStates(rows)).toEqual([
      { state: 'leaking', count: 1 },
      { state: 'tight', count: 2 },
    ])
    expect(harboursOf(rows)).toEqual(['Cold Haven', 'Port Averill'])
  })
})

describe('the words of a row', () => {
  it('never give a hold time without how sure it is', () => {
    expect(holdWords(hold(2.2))).toBe('2.2 h (2 to 2.5 h)')
    expect(holdWords(hold(14, { bound: 'at-least', high: null }))).toBe('at least 14 h')
    expect(holdWords(hold(1.4, { low: 5000, high: 5060 }))).toBe('1.4 h (± 40 s)')
    expect(holdWords(null)).toBe('–')
  })
  it('say how it moves and since when', () => {
    expect(movingWords(row({ moving: { word: 'worse', since: '2026-11-22T12:00:00Z' } }), NOW)).toBe(
      'worse since Sun 22 Nov',
    )
    expect(movingWords(row({ moving: { word: 'stepped', since: '2026-11-29T18:10:00Z' } }), NOW)).toBe(
      'stepped Sun 14:10',
    )
    expect(
      movingWords(row({ moving: { word: 'held-since-repair', since: '2026-11-18T18:10:00Z' } }), NOW),
    ).toBe('held since the repair of 18 Nov')
    expect(movingWords(row(), NOW)).toBe('')
  })
  it('say what tonight brings', () => {
    const tonight = (chance: number, last: number, runs: number) =>
      tonightWords(row({ tonight: { chance, chanceIfFlushedLast: last, expectedRuns: runs } }))
    expect(tonight(0.99, 0.98, 6.2)).toBe('6 runs')
    expect(tonight(0.9, 0.6, 0.7)).toBe('1 run')
    expect(tonight(0.6, 0.1, 0.4)).toBe('quiet if flushed last thing')
    expect(tonight(0.05, 0, 0)).toBe('quiet')
    expect(tonightWords(row({ state: 'short-cycling', holdTime: hold(0.1) }))).toBe('all night, every 6 min')
  })
  it('sum up the fleet, calm or not', () => {
    expect(fleetFinding([row(), row()])).toBe('All 2 hold, and none is likely to run tonight.')
    expect(fleetFinding([row({ state: 'leaking' }), row({ state: 'unheard' })])).toBe(
      'Saltmarsh Hare wants attention, 1 is unheard.',
    )
  })
})
