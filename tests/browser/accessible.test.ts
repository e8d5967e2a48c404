import { AxeBuilder } from '@axe-core/playwright'
import { beforeAll, describe, expect, it } from 'vitest'
import { ACCOUNTS, everybody, newBoat, sawTooth, upload, type Boat } from '../integration/api-boats'
import { overflowOf, readerOf } from './page'

const HOUR = 3_600_000
let boat: Boat
beforeAll(async () => {
  boat = await newBoat(await everybody(), { name: 'Checked Wren', berth: 'Z 93' })
  const to = Math.floor(Date.now() / 60_000) * 60_000 - 60_000
  await upload(boat, sawTooth({ from: to - 50 * HOUR, to, paPerHour: 2500, flushes: [to - 20 * HOUR] }))
})

const SHEETS: { name: string; path: () => string; as: string | null; ready: RegExp }[] = [
  { name: 'the first page', path: () => '/', as: null, ready: /Nobody should hear/ },
  { name: 'sign-in', path: () => '/sign-in', as: null, ready: /Try the demo/ },
  { name: 'leak-down', path: () => '/calculators', as: null, ready: /It would hold/ },
  { name: 'the outbox', path: () => '/outbox', as: null, ready: /Nothing has been sent|messages?$/ },
  { name: 'tonight', path: () => '/tonight', as: ACCOUNTS.owner, ready: /Last seven nights/ },
  { name: 'the fleet', path: () => '/fleet?find=wren', as: ACCOUNTS.manager, ready: /Checked Wren/ },
  { name: 'notices', path: () => '/notices', as: ACCOUNTS.manager, ready: /stand open|stands open| on / },
  ...(
    [
      ['', /At this moment/],
      ['/record', /Filled disc/],
      ['/pump', /Day by day|has not run/],
      ['/notices', /notice|Evidence/],
      ['/visits', /Nobody has come|When/],
      ['/set-up', /The system as drawn/],
    ] as const
  ).map(([slug, ready]) => ({
    name: `a vessel${slug}`,
    path: () => `/vessels/${boat.vesselId}${slug}`,
    as: ACCOUNTS.owner,
    ready,
  })),
]

const WINDOWS = [
  { name: 'in the hand, by night', viewport: { width: 360, height: 780 }, night: true },
  { name: 'on a desk, by day', viewport: { width: 1440, height: 900 }, night: false },
]

describe('WCAG 2.2 AA, and nothing to scroll sideways', () => {
  for (const sheet of SHEETS) {
    for (const window of WINDOWS) {
      it(`${sheet.name} ${window.name}`, async () => {
        const { page, complaints, close } = await readerOf(sheet.as, window)
        await page.goto(sheet.path())
        await page.getByText(sheet.ready).first().waitFor({ state: 'attached' })
        // No script can run in the frame that shows a mail, so none can look into it either.
        await page
          .locator('iframe[sandbox]')
          .evaluateAll((frames) => frames.forEach((frame) => frame.remove()))
        const { violations } = await new AxeBuilder({ page })
          .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
          .analyze()
        expect(
          violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(' ')}`),
        ).toEqual([])
        expect(await overflowOf(page)).toBe(0)
        expect(complaints).toEqual([])
        await close()
      })
    }
  }

  it('fills a wall of 2560 px without stretching its lines of text', async () => {
    const { page, close } = await readerOf(ACCOUNTS.owner, { viewport: { width: 2560, height: 1300 } })
    await page.goto('/tonight')
    await page.getByText('Last seven nights').first().waitFor()
    const widest = await page.evaluate(() => {
      const widthOf = (line: Element) => {
        const range = document.createRange()
        range.selectNodeContents(line)
        return range.getBoundingClientRect().width
      }
      return Math.max(...[...document.querySelectorAll('main p, main li')].map(widthOf))
    })
    expect(widest).toBeLessThan(900)
    expect(await overflowOf(page)).toBe(0)
    await close()
  })
})
