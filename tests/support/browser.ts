import type { Browser, BrowserContext } from 'playwright-core'
import { serverUrl, signIn } from './client'

export { launchBrowser } from './chromium'

export const PHONE = { width: 390, height: 844 }
export const DESKTOP = { width: 1440, height: 900 }

/** A browser window in which this person is signed in already. */
export async function contextOf(
  browser: Browser,
  email: string | null,
  viewport = DESKTOP,
  colorScheme: 'light' | 'dark' = 'light',
): Promise<BrowserContext> {
  const context = await browser.newContext({ baseURL: serverUrl(), viewport, colorScheme })
  if (email === null) return context
  const { cookie } = await signIn(email)
  await context.addCookies(
    cookie.split('; ').map((pair) => {
      const at = pair.indexOf('=')
      return { name: pair.slice(0, at), value: pair.slice(at + 1), url: serverUrl() }
    }),
  )
  return context
}
