import { afterAll, beforeAll } from 'vitest'
import type { Browser, BrowserContext, Page } from 'playwright-core'
import { contextOf, DESKTOP, launchBrowser } from '../support/browser'

let browser: Browser | null = null
beforeAll(async () => {
  browser = await launchBrowser()
})
afterAll(async () => {
  await browser?.close()
})

export interface Reader {
  page: Page
  context: BrowserContext
  /** What the browser complained of: errors of scripts, refused content, answers that were not a success. */
  complaints: string[]
  close(): Promise<void>
}

/** A window of somebody (null: of nobody) that remembers every complaint of the browser. */
export async function readerOf(
  email: string | null,
  options: { viewport?: { width: number; height: number }; night?: boolean } = {},
): Promise<Reader> {
  if (browser === null) throw new Error('the browser has not been launched')
  const context = await contextOf(
    browser,
    email,
    options.viewport ?? DESKTOP,
    options.night ? 'dark' : 'light',
  )
  const page = await context.newPage()
  const complaints: string[] = []
  page.on('console', (message) => {
    // The frame of an e-mail may run nothing, the checker's own scripts included.
    if (message.type() === 'error' && !message.text().includes('about:srcdoc'))
      complaints.push(`${message.text()} ${message.location().url}`)
  })
  page.on('pageerror', (error) => complaints.push(String(error)))
  return { page, context, complaints, close: () => context.close() }
}

/** The page's width beyond its window, CSS pixels: nought when nothing has to be scrolled sideways. */
export const overflowOf = (page: Page): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
