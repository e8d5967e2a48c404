import AxeBuilder from '@axe-core/playwright'
import type { Page } from 'playwright-core'
import { expect, it } from 'vitest'
import { contextOf, launchBrowser, PHONE } from '../support/browser'
import { serverUrl } from '../support/client'
import { lastMailTo, linkIn } from '../support/mailbox'
import { newEmail, newShop, expectStatus, PASSWORD } from '../integration/joining-people'
import { overflowOf, readerOf } from './page'

async function wellMade(page: Page, where: string): Promise<void> {
  await page.waitForFunction(() => !document.body.textContent?.includes('Reading '))
  const { violations } = await new AxeBuilder({ page }).analyze()
  expect(
    violations.map((violation) => `${where}: ${violation.id} at ${violation.nodes[0]?.target.join(' ')}`),
  ).toEqual([])
  expect(await overflowOf(page), where).toBe(0)
}

it('an owner takes a boat over from the shop by the mail, and shuts the shop out again', async () => {
  const shop = await newShop()
  const name = `Marram ${newEmail().slice(0, 6)}`
  const { id: vesselId } = await expectStatus(
    shop.client.send<{ id: string }>('POST', '/api/vessels', { name, timeZone: 'Europe/Lisbon' }),
    201,
  )
  const browser = await launchBrowser()
  try {
    const desk = await contextOf(browser, null)
    await desk.addCookies(
      shop.client.cookie.split('; ').map((pair) => {
        const at = pair.indexOf('=')
        return { name: pair.slice(0, at), value: pair.slice(at + 1), url: serverUrl() }
      }),
    )
    const manager = await desk.newPage()

    // The manager invites the owner where the boat is set up.
    await manager.goto('/people')
    await manager.getByText('You are the only one in the shop.').waitFor()
    await wellMade(manager, 'people')
    await manager.goto(`/vessels/${vesselId}/set-up`)
    const email = newEmail()
    await manager.getByLabel('E-mail of an owner').fill(email)
    await manager.getByRole('button', { name: 'Invite as owner' }).click()
    await manager.getByText(`${email} as owner of ${name}`).waitFor()

    // The owner opens the mail on the phone, names themselves and lets the shop see the leak figures.
    const hand = await browser.newContext({ baseURL: serverUrl(), viewport: PHONE })
    const owner = await hand.newPage()
    await owner.goto(linkIn(await lastMailTo(email)))
    await owner.getByText(`invites you to be an owner of ${name}`).waitFor()
    await wellMade(owner, 'invitation')
    await owner.getByLabel('Your name').fill('Rue Marram')
    await owner.getByLabel('Choose a password').fill('short')
    await owner.getByRole('button', { name: 'Accept' }).click()
    await owner.getByText('Needs at least 10 characters.').waitFor()
    expect(await owner.getByLabel('Your name').inputValue()).toBe('Rue Marram')
    await owner.getByLabel('Choose a password').fill(PASSWORD)
    await owner.getByRole('button', { name: 'Accept' }).click()
    await owner.waitForURL('**/tonight')
    await owner.getByText(name).first().waitFor()

    // The shop sees the boat as long as the owner lets it.
    await manager.goto(`/vessels/${vesselId}`)
    await manager.getByRole('heading', { name, exact: false }).first().waitFor()
    await manager.goto('/fleet')
    await manager.getByText(name).first().waitFor()

    await owner.goto(`/vessels/${vesselId}/access`)
    await owner.getByText('sees the leak figures').first().waitFor()
    await wellMade(owner, 'access')
    await owner.getByRole('button', { name: /^Withdraw the sight of/ }).click()
    await owner.getByRole('button', { name: 'Yes, withdraw' }).click()
    await owner.getByText('Nobody but you can see this boat.').waitFor()
    await owner.getByText(/withdrew the sight of Holm Sanitation/).waitFor()

    const gone = await manager.goto(`/vessels/${vesselId}`)
    expect(gone?.status()).toBe(404)
    await manager.goto('/fleet')
    await manager.getByRole('heading', { name: 'Fleet' }).waitFor()
    await manager.waitForFunction(() => !document.body.textContent?.includes('Reading '))
    expect(await manager.getByText(name).count()).toBe(0)
  } finally {
    await browser.close()
  }
}, 180_000)

it('somebody signs up alone and sets a boat up without a shop', async () => {
  const { page, complaints, close } = await readerOf(null, {
    viewport: { width: 360, height: 740 },
    night: true,
  })
  const email = newEmail()
  await page.goto('/sign-up')
  await wellMade(page, 'sign-up')
  await page.getByLabel('Your name').fill('Wren Holm')
  await page.getByLabel('Your e-mail').fill('wren')
  await page.getByRole('button', { name: 'Send me the link' }).click()
  await page.getByText('Must look like name@boat.example.').waitFor()
  await page.getByLabel('Your e-mail').fill(email)
  await page.getByRole('button', { name: 'Send me the link' }).click()
  await page.getByText('A mail is on its way to').waitFor()
  await page.goto(linkIn(await lastMailTo(email)))
  await wellMade(page, 'confirm')
  await page.getByLabel('Password').fill(PASSWORD)
  await page.getByRole('button', { name: 'Confirm and begin' }).click()
  await page.waitForURL('**/tonight')
  await page.getByRole('link', { name: 'set up a boat of your own' }).click()
  await page.getByLabel('Name of the boat').fill('Holm Lark')
  await page.getByRole('button', { name: 'Set up the boat' }).click()
  await page.waitForURL('**/tonight')
  await page.getByText('Holm Lark').first().waitFor()
  for (const path of ['', '/messages', '/aboard', '/security', '/data']) {
    await page.goto(`/account${path}`)
    await wellMade(page, `account${path}`)
  }
  expect(complaints).toEqual([])
  await close()
}, 180_000)

it('a link that was used says so, and where to get another', async () => {
  const { page, close } = await readerOf(null)
  for (const path of ['/confirm/', '/invitation/', '/reset-password/']) {
    await page.goto(`${path}${'A'.repeat(43)}`)
    await page.getByRole('heading', { name: 'This link leads nowhere' }).waitFor()
    await wellMade(page, path)
  }
  await close()
})
