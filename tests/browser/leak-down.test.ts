import { describe, expect, it } from 'vitest'
import { readerOf } from './page'

describe('leak-down', () => {
  it('judges as it is typed, keeps what was typed in another unit, and sends nothing', async () => {
    const { page, complaints, close } = await readerOf(null)
    await page.goto('/calculators')
    await page.getByText('It would hold about').waitFor()
    const sent: string[] = []
    page.on('request', (request) => {
      if (request.method() !== 'GET') sent.push(request.url())
    })
    await page.getByLabel('Vacuum, second reading').fill('9.8')
    await page.getByLabel('Minutes between, of the test').fill('60')
    await page
      .getByText(/Tight|Weeping/)
      .first()
      .waitFor()
    await page.getByLabel('Vacuum, second reading').fill('nine')
    await page.getByText('Write the second reading as a number.').waitFor()
    await page.getByLabel('Vacuum, second reading').fill('9.4')
    await page.getByLabel('Unit of vacuum').first().selectOption('kPa')
    expect(await page.getByLabel('Vacuum, first reading').inputValue()).toBe('33.525')
    expect(sent).toEqual([])
    expect(complaints).toEqual([])
    await close()
  })

  it('opens again without a connection', async () => {
    const { page, context, close } = await readerOf(null)
    await page.goto('/calculators')
    await page.getByText('It would hold about').waitFor()
    const isKept = () =>
      page.evaluate(async () => {
        const parts = performance
          .getEntriesByType('resource')
          .map((entry) => entry.name)
          .filter((name) => name.includes('/_next/static/'))
        const kept = await Promise.all(['/calculators', ...parts].map((name) => caches.match(name)))
        return navigator.serviceWorker.controller !== null && kept.every((answer) => answer !== undefined)
      })
    await expect.poll(isKept, { timeout: 20_000 }).toBe(true)
    await context.setOffline(true)
    await page.reload()
    await page.getByLabel('Vacuum, second reading').fill('9.1')
    await page.getByText('Lost 0.80 inHg on the gauge').waitFor()
    expect(await page.getByRole('heading', { name: 'Leak-down' }).count()).toBe(1)
    await close()
  })
})
