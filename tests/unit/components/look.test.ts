import { readFileSync } from 'node:fs'
import path from 'node:path'
import { createElement } from 'react'
import { renderToStaticMarkup } from 'react-dom/server'
import { describe, expect, it } from 'vitest'
import { STATE_MEANINGS, STATE_WORDS, STATES } from '@/components/states'
import { StateLabel, StateMark } from '@/components/ui/state-mark'
import { stateSchema } from '@/shared/schemas'

const css = readFileSync(path.resolve(import.meta.dirname, '../../../app/globals.css'), 'utf8')
const tokens = new Map(
  [...css.matchAll(/--([\w-]+): light-dark\((#\w{6}), (#\w{6})\)/g)].map(
    ([, name = '', day = '', night = '']) => [name, [day, night] as const],
  ),
)

/** Relative luminance and contrast ratio of WCAG 2.2. */
function luminance(hex: string): number {
  const [r = 0, g = 0, b = 0] = [1, 3, 5]
    .map((at) => parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((c) => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4))
  return 0.2126 * r + 0.7152 * g + 0.0722 * b
}
function contrast(a: string, b: string): number {
  const [dark = 0, light = 0] = [luminance(a), luminance(b)].sort((x, y) => x - y)
  return (light + 0.05) / (dark + 0.05)
}
function ratio(front: string, back: string, set: 0 | 1): number {
  const [a, b] = [tokens.get(front)?.[set], tokens.get(back)?.[set]]
  if (a === undefined || b === undefined) throw new Error(`no token ${front} or ${back}`)
  return contrast(a, b)
}

describe('the look', () => {
  it('reckons contrast as WCAG does', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 6)
    expect(contrast('#777777', '#ffffff')).toBeCloseTo(4.48, 2)
  })
  for (const [name, set] of [
    ['day', 0],
    ['night', 1],
  ] as const) {
    it(`keeps text at 4.5 to 1 or more, by ${name}`, () => {
      for (const front of ['ink', 'ink-2', 'act', 'attention', 'buff-ink', 'sound'])
        for (const back of ['water', 'shallow'])
          expect(ratio(front, back, set), `${front} on ${back}`).toBeGreaterThanOrEqual(4.5)
      expect(ratio('buff-ink', 'buff', set)).toBeGreaterThanOrEqual(4.5)
      expect(ratio('water', 'act', set)).toBeGreaterThanOrEqual(4.5)
      expect(ratio('attention', 'attention-soft', set)).toBeGreaterThanOrEqual(4.5)
    })
    it(`keeps marks, ticks and fields at 3 to 1 or more, by ${name}`, () => {
      const pairs = [
        ['field', 'water'],
        ['tick-flush', 'twilight'],
        ['tick-run', 'twilight'],
        ['tick-calm', 'twilight'],
        ['tick-flush-quiet', 'quiet'],
        ['tick-run-quiet', 'quiet'],
        ['tick-calm-quiet', 'quiet'],
        ['tick-expected', 'quiet'],
      ] as const
      for (const [front, back] of pairs)
        expect(ratio(front, back, set), `${front} on ${back}`).toBeGreaterThanOrEqual(3)
    })
  }
})

describe('the marks', () => {
  it('are ten, one for every state there is, no two alike even in grey', () => {
    expect([...STATES].sort()).toEqual([...stateSchema.options].sort())
    const shapes = STATES.map((state) =>
      renderToStaticMarkup(createElement(StateMark, { state }))
        .replace(/class="[^"]*"/, '')
        .replace(/data-state="[^"]*"/, ''),
    )
    expect(new Set(shapes).size).toBe(10)
  })
  it('stand beside their word', () => {
    for (const state of STATES) {
      expect(renderToStaticMarkup(createElement(StateLabel, { state }))).toContain(STATE_WORDS[state])
      expect(STATE_MEANINGS[state]).not.toBe('')
    }
  })
})
