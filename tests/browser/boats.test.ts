import { beforeAll, describe, expect, it } from 'vitest'
import {
  ACCOUNTS,
  everybody,
  newBoat,
  sawTooth,
  upload,
  type Boat,
  type People,
} from '../integration/api-boats'
import { PHONE } from '../support/browser'
import { readerOf } from './page'

const HOUR = 3_600_000
const TO = Math.floor(Date.now() / 60_000) * 60_000 - 60_000
const FROM = TO - 60 * HOUR

let people: People
let leaking: Boat
let tight: Boat
beforeAll(async () => {
  people = await everybody()
  leaking = await newBoat(people, { name: 'Browser Hare', berth: 'Z 91' })
  tight = await newBoat(people, { name: 'Browser Lark', berth: 'Z 92' })
  // Hold times of 2 h and 24 h between these switch points.
  await upload(leaking, sawTooth({ from: FROM, to: TO, paPerHour: 3048, flushes: [TO - 30 * HOUR] }))
  await upload(tight, sawTooth({ from: FROM, to: TO, paPerHour: 254, flushes: [TO - 30 * HOUR] }))
})

describe('an owner’s evening', () => {
  it('says what the night will bring, why, and what to do; and hears that nobody is aboard', async () => {
    const { page, complaints, close } = await readerOf(ACCOUNTS.owner, { viewport: PHONE })
    await page.goto('/tonight')
    const sheet = page.getByRole('article', { name: 'Browser Hare' })
    const sentence = sheet.locator('[data-kind]')
    await sentence.waitFor()
    expect(await sentence.textContent()).toMatch(
      /^Browser Hare’s pump is likely to run (once|twice|\d+ times) tonight, first/,
    )
    await sheet.getByText(/It stays quiet for (2|2\.\d|1\.9) h between runs/).waitFor()
    await sheet.getByText('Never a breaker that feeds a bilge pump', { exact: false }).first().waitFor()
    await sheet.getByLabel('Nobody aboard').check()
    await sheet.getByText('Nobody is aboard Browser Hare tonight').waitFor()
    await sheet.getByLabel('Tell by the flushes').check()
    await sheet.getByText('is likely to run').waitFor()
    const calm = page.getByRole('article', { name: 'Browser Lark' }).locator('[data-kind]')
    expect(await calm.textContent()).toMatch(/quiet tonight\.$/)
    expect(complaints).toEqual([])
    await close()
  })

  it('can ask for a visit, and be told that it was asked', async () => {
    const { page, close } = await readerOf(ACCOUNTS.owner)
    await page.goto('/tonight')
    const sheet = page.getByRole('article', { name: 'Browser Hare' })
    await sheet.getByLabel('What you noticed', { exact: false }).fill('Runs at night since Sunday.')
    await sheet.getByRole('button', { name: /^Ask .* for a visit/ }).click()
    await sheet.getByText('You have asked for a visit').waitFor()
    await close()
  })
})

describe('the shop’s morning', () => {
  it('finds a boat by the slash key, opens it by Enter, and comes back to the same view', async () => {
    const { page, complaints, close } = await readerOf(ACCOUNTS.manager)
    await page.goto('/fleet')
    await page.getByRole('table', { name: 'Fleet' }).waitFor()
    await page.keyboard.press('/')
    await page.keyboard.type('browser z 91')
    await page.getByRole('link', { name: 'Browser Hare' }).waitFor()
    expect(await page.getByRole('link', { name: 'Browser Lark' }).count()).toBe(0)
    expect(new URL(page.url()).searchParams.get('find')).toBe('browser z 91')
    await page.keyboard.press('ArrowDown')
    await page.keyboard.press('Enter')
    await page.waitForURL(`**/vessels/${leaking.vesselId}*`)
    await page.getByRole('heading', { name: 'Browser Hare' }).waitFor()
    await page.goBack()
    await page.getByRole('link', { name: 'Browser Hare' }).waitFor()
    expect(await page.getByLabel('Find a boat or berth').inputValue()).toBe('browser z 91')
    expect(complaints).toEqual([])
    await close()
  })

  it('puts the leaking boat before the tight one, and moves between them by arrow keys', async () => {
    const { page, close } = await readerOf(ACCOUNTS.manager)
    await page.goto('/fleet?find=browser')
    const links = page.locator('[data-fleet-link]')
    await links.nth(1).waitFor()
    expect(await links.allTextContents()).toEqual(['Browser Hare', 'Browser Lark'])
    await links.first().focus()
    await page.keyboard.press('ArrowDown')
    expect(await page.evaluate(() => document.activeElement?.textContent)).toBe('Browser Lark')
    await page.keyboard.press('Home')
    expect(await page.evaluate(() => document.activeElement?.textContent)).toBe('Browser Hare')
    await close()
  })
})

describe('the record', () => {
  it('opens at a link’s stretch, comes closer by keyboard, and tells what it shows in words', async () => {
    const { page, complaints, close } = await readerOf(ACCOUNTS.owner)
    const query = `from=${new Date(TO - 24 * HOUR).toISOString()}&to=${new Date(TO).toISOString()}`
    await page.goto(`/vessels/${leaking.vesselId}/record?${query}`)
    await page.getByText(/In 24 h the pump ran \d+ times/).waitFor()
    await page.locator('figure canvas').first().waitFor()
    const figure = page.getByRole('figure', { name: /Trace of the vacuum/ })
    await figure.focus()
    await page.keyboard.press('+')
    await page.getByText(/In 12 h the pump ran \d+ times/).waitFor()
    const seen = new URL(page.url()).searchParams
    expect(Date.parse(seen.get('to') ?? '') - Date.parse(seen.get('from') ?? '')).toBe(12 * HOUR)
    await page.getByText('The runs as a table').click()
    await page.getByRole('cell', { name: 'by itself' }).first().waitFor()
    expect(complaints).toEqual([])
    await close()
  })

  it('does not exist for a stranger', async () => {
    const { page, close } = await readerOf(ACCOUNTS.strangeManager)
    const answer = await page.goto(`/vessels/${leaking.vesselId}/record`)
    expect(answer?.status()).toBe(404)
    expect(await page.getByText('Browser Hare').count()).toBe(0)
    await close()
  })
})
