import { describe, expect, it } from 'vitest'
import { DEMO_PASSWORD } from '../support/settings'
import { readerOf } from './page'

describe('the first page', () => {
  it('leads to the demo, and the demo to an owner’s night, in two presses', async () => {
    const { page, complaints, close } = await readerOf(null)
    await page.goto('/')
    expect(await page.getByRole('img', { name: /^1 Nov: quiet/ }).count()).toBe(1)
    await page.getByRole('link', { name: 'Try the demo' }).click()
    await page.getByRole('button', { name: 'Enter as Owner' }).click()
    await page.waitForURL('**/tonight')
    await page.getByRole('link', { name: 'Tonight' }).waitFor()
    expect(complaints).toEqual([])
    await close()
  })
})

describe('signing in', () => {
  it('keeps what was typed when it is refused, says why, and then lets the person in where they wanted to go', async () => {
    const { page, close } = await readerOf(null)
    await page.goto('/notices')
    expect(new URL(page.url()).pathname).toBe('/sign-in')
    await page.getByLabel('E-mail').fill('manager@saltern.example')
    await page.getByLabel('Password').fill('not the password')
    await page.getByRole('button', { name: 'Sign in' }).click()
    await page.getByRole('alert').filter({ hasText: 'do not go together' }).waitFor()
    expect(await page.getByLabel('E-mail').inputValue()).toBe('manager@saltern.example')
    expect(await page.getByLabel('Password').inputValue()).toBe('not the password')
    await page.getByLabel('Password').fill(DEMO_PASSWORD)
    await page.getByRole('button', { name: 'Sign in' }).click()
    await page.waitForURL('**/notices')
    await page.getByRole('heading', { name: 'Notices' }).waitFor()
    await close()
  })

  it('says what is wrong with a field beside it, before anything is sent', async () => {
    const { page, close } = await readerOf(null)
    await page.goto('/sign-in')
    await page.getByLabel('E-mail').fill('nobody')
    await page.getByRole('button', { name: 'Sign in' }).click()
    await page.getByText('Write the address as in').waitFor()
    expect(await page.getByLabel('E-mail').getAttribute('aria-invalid')).toBe('true')
    await close()
  })

  it('ends when the person signs out', async () => {
    const { page, close } = await readerOf('manager@saltern.example')
    await page.goto('/fleet')
    await page.getByRole('button', { name: 'Sign out' }).click()
    await page.getByRole('link', { name: 'Sign in' }).first().waitFor()
    await page.goto('/fleet')
    expect(new URL(page.url()).pathname).toBe('/sign-in')
    await close()
  })
})

describe('day and night', () => {
  it('follow the system until the reader chooses, and are kept from the first frame of the next page', async () => {
    const { page, close } = await readerOf(null, { night: true })
    const ground = () => page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor)
    await page.goto('/')
    expect(await ground()).toBe('rgb(10, 21, 27)')
    await page.getByLabel('Colours for day or night').first().selectOption('day')
    expect(await ground()).toBe('rgb(255, 255, 255)')
    const html = await (await page.request.get('/calculators')).text()
    expect(html).toContain('data-theme="day"')
    await close()
  })
})

describe('an address that is nobody’s', () => {
  it('is answered 404 with a way on', async () => {
    const { page, close } = await readerOf(null)
    const answer = await page.goto('/no-such-sheet')
    expect(answer?.status()).toBe(404)
    await page.getByRole('link', { name: 'To the first page' }).waitFor()
    await close()
  })
})
