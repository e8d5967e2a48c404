'use client'

import { useSyncExternalStore } from 'react'

const TOKENS = [
  'water',
  'shallow',
  'shoal',
  'line',
  'ink',
  'ink-2',
  'field',
  'act',
  'attention',
  'attention-soft',
  'buff-ink',
  'sound',
] as const
export type Colours = Record<(typeof TOKENS)[number], string> & { font: string }

const EMPTY: Colours = {
  water: '#fff',
  shallow: '#fff',
  shoal: '#ccc',
  line: '#ccc',
  ink: '#000',
  'ink-2': '#000',
  field: '#777',
  act: '#000',
  attention: '#000',
  'attention-soft': '#eee',
  'buff-ink': '#000',
  sound: '#000',
  font: 'sans-serif',
}

/** Reads the tokens as a canvas needs them: plain colours of the set that is in force now. */
function readColours(): Colours {
  const probe = document.createElement('span')
  document.body.append(probe)
  const colours = { ...EMPTY, font: getComputedStyle(document.body).fontFamily }
  for (const token of TOKENS) {
    probe.style.color = `var(--${token})`
    colours[token] = getComputedStyle(probe).color
  }
  probe.remove()
  return colours
}

let known: { key: string; colours: Colours } | null = null
const themeKey = (): string =>
  [
    document.documentElement.dataset.theme ?? '',
    matchMedia('(prefers-color-scheme: dark)').matches,
    matchMedia('print').matches,
  ].join()

function snapshot(): Colours {
  const key = themeKey()
  if (known?.key !== key) known = { key, colours: readColours() }
  return known.colours
}

function subscribe(changed: () => void): () => void {
  const observer = new MutationObserver(changed)
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] })
  const queries = [matchMedia('(prefers-color-scheme: dark)'), matchMedia('print')]
  for (const query of queries) query.addEventListener('change', changed)
  return () => {
    observer.disconnect()
    for (const query of queries) query.removeEventListener('change', changed)
  }
}

/** The look's colours for a canvas, renewed when day turns to night or the sheet goes to paper. */
export const useColours = (): Colours => useSyncExternalStore(subscribe, snapshot, () => EMPTY)
