import { describe, expect, it } from 'vitest'
import { adviceFor } from '@/components/tonight/advice'
import { plain } from '@/components/tonight/phrases'
import { tonightReason } from '@/components/tonight/reason'
import {
  tonightKind,
  tonightSentence,
  type TonightFacts,
  type TonightKind,
} from '@/components/tonight/sentences'
import { stateSchema } from '@/shared/schemas'
import { hold, NOW, OFFSETS, outlook, summary } from './fixtures'

const facts = (change: Partial<TonightFacts> = {}): TonightFacts => ({
  name: 'Saltmarsh Hare',
  summary: summary(),
  outlook: outlook(),
  offsets: OFFSETS,
  nowMs: NOW,
  ...change,
})
const calm = { chance: 0.01, chanceIfFlushedLast: 0, expectedRuns: 0, firstRun: null }

/** Every sentence that there is, the facts it is said of, and its words. */
const SAID: Record<TonightKind, { facts: TonightFacts; words: string }> = {
  'laid-up': {
    facts: facts({ summary: summary({ state: 'laid-up' }) }),
    words: 'Saltmarsh Hare is laid up. Nothing is sent until it is back in use.',
  },
  'worked-on': {
    facts: facts({ summary: summary({ state: 'worked-on' }) }),
    words: 'Somebody is working on Saltmarsh Hare. Warnings wait until they are done.',
  },
  unheard: {
    facts: facts({ summary: summary({ state: 'unheard', lastHeardAt: '2026-11-29T18:10:00Z' }) }),
    words: 'Nothing heard from Saltmarsh Hare since Sun 14:10, so tonight cannot be foretold.',
  },
  'running-on': {
    facts: facts({ summary: summary({ state: 'running-on', since: '2026-12-01T22:20:00Z' }) }),
    words: 'Saltmarsh Hare’s pump has not stopped for 20 min.',
  },
  off: {
    facts: facts({ summary: summary({ state: 'off' }) }),
    words: 'Saltmarsh Hare’s pump is off. It will not run tonight, and the toilets will not flush.',
  },
  away: {
    facts: facts({ summary: summary({ aboard: 'away' }) }),
    words: 'Nobody is aboard Saltmarsh Hare tonight, so nobody will be woken.',
  },
  learning: {
    facts: facts({
      summary: summary({ state: 'learning', holdTime: null }),
      outlook: outlook({ basis: 'learning' }),
    }),
    words: 'Still getting to know Saltmarsh Hare. After about a day of use the night can be foretold.',
  },
  'short-cycling': {
    facts: facts({ summary: summary({ state: 'short-cycling', holdTime: hold(0.1) }) }),
    words: 'Saltmarsh Hare’s pump runs by itself every 6 min, and will all night.',
  },
  likely: {
    facts: facts(),
    words: 'Saltmarsh Hare’s pump is likely to run 6 times tonight, first by about 00:00.',
  },
  'flush-last': {
    facts: facts({
      summary: summary({ state: 'tight', holdTime: hold(11) }),
      outlook: outlook({ chance: 0.6, chanceIfFlushedLast: 0.1 }),
    }),
    words: 'Flush last thing, and Saltmarsh Hare should stay quiet tonight.',
  },
  'probably-quiet': {
    facts: facts({ outlook: outlook({ ...calm, chance: 0.3 }), summary: summary({ state: 'weeping' }) }),
    words: 'Saltmarsh Hare will probably be quiet tonight.',
  },
  quiet: {
    facts: facts({ outlook: outlook(calm), summary: summary({ state: 'tight' }) }),
    words: 'Saltmarsh Hare should be quiet tonight.',
  },
}

describe('the sentence about tonight', () => {
  for (const [kind, said] of Object.entries(SAID)) {
    it(`says what is ${kind}`, () => {
      expect(tonightKind(said.facts)).toBe(kind)
      expect(plain(tonightSentence(said.facts))).toBe(said.words)
    })
  }

  it('has something to say in every state, with an outlook and without', () => {
    for (const state of stateSchema.options) {
      for (const coming of [outlook(), null]) {
        const words = plain(tonightSentence(facts({ summary: summary({ state }), outlook: coming })))
        expect(words).toMatch(/Saltmarsh Hare.*\.$/)
      }
    }
  })

  it('names a minute only when the phase is known', () => {
    const known = outlook({
      basis: 'phase-known',
      expectedRuns: 1,
      firstRun: {
        at: '2026-12-02T05:20:00Z',
        earliest: '2026-12-02T05:00:00Z',
        latest: '2026-12-02T05:40:00Z',
      },
    })
    expect(plain(tonightSentence(facts({ outlook: known })))).toBe(
      'Saltmarsh Hare’s pump is likely to run once tonight, at about 01:20.',
    )
  })

  it('never promises a quiet night from an even chance', () => {
    const even = facts({ outlook: outlook({ chance: 0.5, chanceIfFlushedLast: 0.5 }) })
    expect(tonightKind(even)).toBe('likely')
  })

  it('says so of a boat that was never heard', () => {
    const never = facts({ summary: summary({ state: 'unheard', lastHeardAt: null }) })
    expect(plain(tonightSentence(never))).toContain('has not been heard yet')
  })
})

describe('the reason beneath it', () => {
  it('gives the hold time with its interval, the night’s length and what it was measured from', () => {
    expect(tonightReason(facts())).toBe(
      'It stays quiet for 1.4 h between runs (1.3 to 1.6 h); this night is 9 h. The first time is for a last flush at 22:30. Measured from 22 undisturbed stretches over 24 h.',
    )
  })
  it('says a bound as a bound', () => {
    const bound = facts({
      summary: summary({
        state: 'tight',
        holdTime: hold(14, { bound: 'at-least', high: null }),
        leakRate: null,
      }),
      outlook: outlook(calm),
    })
    expect(tonightReason(bound)).toBe(
      'It stays quiet for at least 14 h between runs; this night is 9 h. Chance of a run: 1 %. Judged from 9 pauses of the pump.',
    )
  })
  it('adds nothing where there is nothing to add', () => {
    expect(tonightReason(SAID['laid-up'].facts)).toBe('')
  })
})

describe('what to do', () => {
  it('lets the pump stop before the water goes in, in that order', () => {
    const [first] = adviceFor('likely')
    expect(first?.indexOf('let the pump stop')).toBeLessThan(first?.indexOf('cup of water') ?? -1)
  })
  it('names the bilge pump wherever a breaker is named', () => {
    for (const kind of ['likely', 'short-cycling', 'running-on'] as const) {
      const steps = adviceFor(kind).join(' ')
      expect(steps).toContain('breaker')
      expect(steps).toContain('Never a breaker that feeds a bilge pump')
    }
  })
  it('leaves a quiet night alone', () => {
    expect(adviceFor('quiet')).toEqual([])
  })
})
