import { randomUUID } from 'node:crypto'
import AxeBuilder from '@axe-core/playwright'
import type { Browser, BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { inHgToPa } from '@/shared/units'
import { contextOf, launchBrowser } from '../support/browser'
import { Device, type DeviceSample } from '../support/fitted-device'

const CUT_OUT_PA = inHgToPa(10)
const NARROW = { width: 360, height: 780 }

let browser: Browser
let context: BrowserContext
let page: Page
/** Page, server and device share this clock, so that minutes of a test take no time. */
let now = Math.floor(Date.now() / 1000) * 1000
const device = new Device(`B-${randomUUID().slice(0, 8)}`, () => now)
const complaints: string[] = []

beforeAll(async () => {
  browser = await launchBrowser()
  context = await contextOf(browser, 'installer@saltern.example', NARROW)
  page = await context.newPage()
  page.setDefaultTimeout(20_000)
  page.on('pageerror', (error) => complaints.push(error.message))
  await later(0)
})
afterAll(() => browser.close())

async function later(seconds: number): Promise<void> {
  now += seconds * 1000
  await context.setExtraHTTPHeaders({ 'x-now': new Date(now).toISOString() })
}

/** Time goes on with a sample each `every` seconds, as the logger on the boat sends them. */
async function live(
  seconds: number,
  every: number,
  vacuumPa: (s: number) => number,
  pumpOn: (s: number) => boolean = () => false,
): Promise<void> {
  const samples: DeviceSample[] = []
  for (let s = every; s <= seconds; s += every)
    samples.push({ at: now + s * 1000, vacuumPa: Math.round(vacuumPa(s)), pumpOn: pumpOn(s) })
  await later(seconds)
  await device.send(samples)
}

const press = (name: string | RegExp) => page.getByRole('button', { name }).first().click()
const heading = (name: string) => page.getByRole('heading', { name, level: 2 }).waitFor()
const says = (text: string | RegExp) => page.locator('main').getByText(text).first().waitFor()

/** Fits a narrow phone, and nothing that a screen reader would stumble over. */
async function sound(): Promise<void> {
  const wide = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth)
  expect(wide, page.url()).toBeLessThanOrEqual(0)
  const { violations } = await new AxeBuilder({ page }).include('main').analyze()
  expect(
    violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`),
    page.url(),
  ).toEqual([])
}

describe('an installer registers a logger to a new boat', () => {
  it('takes the code that the logger shows, and refuses one that nobody shows', async () => {
    await page.goto('/claim?code=BBBB-BBBB')
    await says(/no such code/)
    const address = new URL(await device.askToBeClaimed())
    expect(address.pathname).toBe('/claim')
    await page.goto(address.pathname + address.search)
    await says(device.serial)
    await says(device.userCode)
    await sound()
    await press(/It is the one in my hand/)
    await heading('Boat and system')
    await sound()
  })

  it('sets up the boat', async () => {
    await press('Set up a new boat')
    await page.getByLabel('Name of the boat').fill(`Sanderling ${device.serial}`)
    expect(await page.getByLabel('Time zone').inputValue()).toBe('America/New_York')
    await sound()
    await press('Set up the boat')
    await heading('Logger and key')
    await says(`Sanderling ${device.serial}`)
  })

  it('grants the key, which the logger fetches itself', async () => {
    expect(await device.poll()).toBe('authorization_pending')
    await sound()
    await press('Grant it its key')
    await says(/Granted/)
    await later(6)
    expect(await device.poll()).toBeNull()
    await press(/Go on to the first reading/)
  })

  it('waits for the first reading, and takes it', async () => {
    await heading('First reading')
    await press('Look for readings')
    await press('Check what arrived')
    await says(/Nothing has arrived yet/)
    await sound()
    await live(10, 2, () => 30)
    await press('Check what arrived')
    await says('Passed')
    await press('Go on')
  })

  it('takes the leak-down by hand', async () => {
    await heading('Leak-down before fitting')
    await press('Begin')
    await later(1_800)
    await page.getByLabel('First, inHg').fill('10,0')
    await page.getByLabel('Second, inHg').fill('9,9')
    await page.getByLabel('Minutes between').fill('30')
    await press('What would it show?')
    await says(/inHg\/h/)
    await press('Enter the readings')
    await says('Passed')
    await sound()
    await press('Go on')
  })

  it('can be left and is resumed where it was', async () => {
    await page.goto('/register')
    await page.getByRole('link', { name: new RegExp(`${device.serial}: go on with zero check`) }).click()
    await heading('Zero check')
    await press(/The port is open/)
    await live(12, 2, () => 30)
    await press('Check the readings')
    await says('Passed')
    await press('Go on')
  })

  it('compares with the hand gauge, and keeps what was typed on a refusal', async () => {
    await heading('Two-point check')
    await press('Begin')
    await live(60, 2, () => CUT_OUT_PA + 30)
    await page.getByLabel('Gauge reads, inHg').fill('ten')
    await press('Compare the two')
    await says(/as a number/)
    expect(await page.getByLabel('Gauge reads, inHg').inputValue()).toBe('ten')
    await page.getByLabel('Gauge reads, inHg').fill('10')
    await press('Compare the two')
    await says(/agree within/)
    await press('Go on')
  })

  it('sees one flush', async () => {
    await heading('Pump channel')
    await press(/Begin, then flush once/)
    await live(6, 1, (s) => (s < 3 ? CUT_OUT_PA : CUT_OUT_PA - inHgToPa(3)))
    await live(
      30,
      1,
      (s) => CUT_OUT_PA - inHgToPa(3) * (1 - s / 30),
      () => true,
    )
    await live(20, 1, () => CUT_OUT_PA)
    await press(/It has stopped/)
    await says(/Start and stop were both seen/)
    await press('Go on')
  })

  it('says what to try when the pump starts with its breaker off', async () => {
    await heading('Breaker off')
    await press(/off and tagged/)
    await live(20, 2, () => CUT_OUT_PA - inHgToPa(4))
    await live(
      20,
      2,
      (s) => CUT_OUT_PA - inHgToPa(4 - s / 20),
      () => true,
    )
    await press('Check it')
    await says('Did not pass')
    await says(/was not its breaker/)
    await sound()
    await press('Try again')
    await live(90, 2, () => CUT_OUT_PA - inHgToPa(4))
    await press('Check it')
    await says(/stayed off/)
    await press('Go on')
  })

  it('leaves out what cannot be done, with its reason', async () => {
    await heading('Leak-down after fitting')
    await page.getByText('Leave this check out').click()
    await page.getByLabel('Why it is left out').fill('The crew are aboard; the first quiet night tells')
    await press('Leave it out')
    await says('Left out')
    await press('Go on')
  })

  it('signs the record off', async () => {
    await heading('Record')
    await press('Sign it off')
    await says(/Signed off: the logger and its fitting are proven/)
    await sound()
    await page.getByRole('link', { name: 'The record to print or send' }).click()
    await page.getByRole('heading', { name: 'Commissioning record', level: 1 }).waitFor()
    await says(/Did not pass/)
    await sound()
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'Get it as PDF' }).click(),
    ])
    expect(download.suggestedFilename()).toMatch(/^commissioning-\d+\.pdf$/)
  })

  it('is found among the loggers, and its key can be rolled', async () => {
    await page.goto('/loggers')
    await page.getByLabel('Find by serial or boat').fill(device.serial)
    await sound()
    await page.getByRole('link', { name: device.serial }).click()
    await says(/heard and well/)
    await sound()
    await press('Roll the key')
    await press('Make the new key now')
    const key = await page.locator('[data-key]').innerText()
    expect(key).toMatch(/^mwk_[\w-]{43}$/)
    await page.getByRole('img', { name: /as a QR code/ }).waitFor()
    await expect(device.send([{ at: now, vacuumPa: 1, pumpOn: false }])).rejects.toThrow('401')
    device.key = key
    await live(2, 2, () => CUT_OUT_PA)
    await sound()
  })

  it('brought no page down', () => {
    expect(complaints).toEqual([])
  })
})
