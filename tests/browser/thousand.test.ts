import { describe, expect, it } from 'vitest'
import { ACCOUNTS } from '../integration/api-boats'
import { PHONE } from '../support/browser'
import { readerOf } from './page'

/** A thousand invented rows in the form of the fleet's own answer. */
const rows = Array.from({ length: 1000 }, (_, index) => ({
  vesselId: String(index + 1),
  systemId: String(index + 1),
  name: `Tern ${String(index).padStart(4, '0')}`,
  systemName: '',
  harbour: 'Port Averill',
  berth: `A ${index}`,
  timeZone: 'Etc/UTC',
  utcOffsetSeconds: 0,
  state: 'tight',
  since: null,
  holdTime: { seconds: 30_000 + index, low: 29_000, high: 31_500 + index, bound: null, holds: 9 },
  limitSeconds: 10_800,
  aimSeconds: 28_800,
  moving: null,
  tonight: null,
  lastHeardAt: new Date().toISOString(),
  openNotices: [],
  nextVisitAt: null,
}))

describe('a fleet of a thousand', () => {
  for (const viewport of [{ width: 1440, height: 900 }, PHONE]) {
    it(`draws only the rows in view and reaches the last by one key, ${viewport.width} px wide`, async () => {
      const { page, complaints, close } = await readerOf(ACCOUNTS.manager, { viewport })
      await page.route('**/api/vessels?*', (route) => route.fulfill({ json: { items: rows, next: null } }))
      const asked: number[] = []
      await page.route('**/api/nights?*', (route) => {
        asked.push((new URL(route.request().url()).searchParams.get('systems') ?? '').split(',').length)
        return route.fulfill({ json: { items: [] } })
      })
      await page.goto('/fleet')
      const links = page.locator('[data-fleet-link]')
      await links.first().waitFor()
      expect(await links.count()).toBeLessThan(60)
      await links.first().focus()
      await page.keyboard.press('End')
      await page.waitForFunction(() => document.activeElement?.textContent === 'Tern 0999')
      expect(await links.count()).toBeLessThan(60)
      expect(await page.getByRole('table').getAttribute('aria-rowcount')).toBe('1001')
      expect(Math.max(...asked)).toBeLessThanOrEqual(32)
      expect(complaints).toEqual([])
      await close()
    })
  }
})
