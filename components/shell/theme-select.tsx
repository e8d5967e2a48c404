'use client'

import { useState } from 'react'
import { keepPreference, parseTheme, THEME_COOKIE, type Theme } from '@/components/shell/preferences'

const WORDS: Record<Theme, string> = { system: 'Day or night', day: 'Day', night: 'Night' }

/** Day, night, or as the system says; kept in a cookie so that the next page is drawn right from its first frame. */
export function ThemeSelect({ initial }: { initial: Theme }) {
  const [theme, setTheme] = useState(initial)
  const choose = (next: Theme) => {
    setTheme(next)
    keepPreference(THEME_COOKIE, next)
    if (next === 'system') delete document.documentElement.dataset.theme
    else document.documentElement.dataset.theme = next
  }
  return (
    <select
      aria-label="Colours for day or night"
      className="min-h-9 rounded-sm border border-transparent bg-water px-1 text-ink-2 hover:border-field"
      value={theme}
      onChange={(event) => choose(parseTheme(event.target.value))}
    >
      {(['system', 'day', 'night'] as const).map((value) => (
        <option key={value} value={value}>
          {WORDS[value]}
        </option>
      ))}
    </select>
  )
}
