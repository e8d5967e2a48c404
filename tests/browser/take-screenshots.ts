import { mkdirSync } from 'node:fs'
import path from 'node:path'
import type { Page } from 'playwright-core'
import { launchBrowser } from '../support/chromium'

/**
 * Takes the pictures of the README from a running demo: `npm run screenshots` beside `npm start`.
 * APP_URL says where it runs (default http://127.0.0.1:3000).
 */
const URL_OF_DEMO = process.env.APP_URL ?? 'http://127.0.0.1:3000'
const PASSWORD = process.env.DEMO_PASSWORD ?? 'middle-watch-demo'
const FOLDER = path.resolve(import.meta.dirname, '../../public/screenshots')
const DESKTOP = { width: 1440, height: 900 }
const PHONE = { width: 390, height: 844 }

interface Picture {
  name: string
  as: string | null
  /** The address, or how to find it from the home page of that person. */
  open: string | ((page: Page) => Promise<void>)
  viewport: { width: number; height: number }
  night?: boolean
}

const vessel = (tab: string) => async (page: Page) => {
  await page.goto('/fleet')
  await page
    .getByRole('link', { name: /Petrichor/ })
    .first()
    .click()
  await page.waitForURL(/\/vessels\/\d+/)
  if (tab !== '') await page.goto(`${new URL(page.url()).pathname}/${tab}`)
}

const MANAGER = 'manager@saltern.example'
const OWNER = 'owner@saltern.example'
const PICTURES: Picture[] = [
  { name: 'home', as: null, open: '/', viewport: DESKTOP },
  { name: 'sign-in', as: null, open: '/sign-in', viewport: DESKTOP },
  { name: 'calculators', as: null, open: '/calculators', viewport: DESKTOP },
  { name: 'fleet', as: MANAGER, open: '/fleet', viewport: DESKTOP },
  { name: 'fleet-phone', as: MANAGER, open: '/fleet', viewport: PHONE },
  { name: 'tonight-phone-night', as: OWNER, open: '/tonight', viewport: PHONE, night: true },
  { name: 'tonight', as: OWNER, open: '/tonight', viewport: DESKTOP },
  { name: 'vessel-now', as: MANAGER, open: vessel(''), viewport: DESKTOP },
  { name: 'vessel-record', as: MANAGER, open: vessel('record'), viewport: DESKTOP },
  { name: 'vessel-pump', as: MANAGER, open: vessel('pump'), viewport: DESKTOP },
  { name: 'vessel-set-up', as: MANAGER, open: vessel('set-up'), viewport: DESKTOP },
  { name: 'notices', as: MANAGER, open: '/notices', viewport: DESKTOP },
  { name: 'loggers', as: MANAGER, open: '/loggers', viewport: DESKTOP },
  { name: 'register-phone', as: 'installer@saltern.example', open: '/register', viewport: PHONE },
  { name: 'people', as: MANAGER, open: '/people', viewport: DESKTOP },
  { name: 'shop', as: MANAGER, open: '/shop', viewport: DESKTOP },
  { name: 'account', as: OWNER, open: '/account', viewport: DESKTOP },
  { name: 'outbox', as: null, open: '/outbox', viewport: DESKTOP },
]

mkdirSync(FOLDER, { recursive: true })
const browser = await launchBrowser()
try {
  for (const picture of PICTURES) {
    const context = await browser.newContext({
      baseURL: URL_OF_DEMO,
      viewport: picture.viewport,
      colorScheme: picture.night === true ? 'dark' : 'light',
      reducedMotion: 'reduce',
    })
    const page = await context.newPage()
    if (picture.as !== null) await signIn(page, picture.as)
    if (typeof picture.open === 'string') await page.goto(picture.open)
    else await picture.open(page)
    await page.waitForLoadState('networkidle')
    // Charts are drawn in the frame after their data.
    await page.waitForFunction(() => document.querySelector('[role=status] .live') === null)
    await page.evaluate(
      () => new Promise((resolve) => requestAnimationFrame(() => requestAnimationFrame(resolve))),
    )
    await page.screenshot({
      path: path.join(FOLDER, `${picture.name}.png`),
      fullPage: picture.viewport === PHONE,
    })
    console.log(picture.name)
    await context.close()
  }
} finally {
  await browser.close()
}

async function signIn(page: Page, email: string): Promise<void> {
  await page.goto('/sign-in')
  await page.getByLabel(/mail/i).fill(email)
  await page.getByLabel(/^password/i).fill(PASSWORD)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'))
}
