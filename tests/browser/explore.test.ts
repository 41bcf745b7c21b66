import { mkdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { AxeBuilder } from '@axe-core/playwright'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Browser, Page } from 'playwright-core'
import { bundledEntries, loadEntries } from '../server/support/bundledSample.ts'
import { listening, type Listening } from '../server/support/listening.ts'
import { address, openTestServer, password, type TestServer } from '../server/support/testServer.ts'
import { chromiumPath, launch, openPage, type Theme, type Watched } from './browser.ts'

const shots = fileURLToPath(new URL('./screenshots/', import.meta.url))

/** Every width in both themes with ALL_SIZES=1, for looking at. */
const everySize = process.env.ALL_SIZES === '1'
const views: [width: number, theme: Theme][] = everySize
  ? [380, 900, 1440].flatMap((width) =>
      (['light', 'dark'] as const).map((theme): [number, Theme] => [width, theme]),
    )
  : [[380, 'dark']]

/** Names of what is shown, by the query of an address. */
const shown: Record<string, string> = {
  one: 'c=log10(metric.divisor.top)',
  two: 'c=volume&c=metric.divisor.top&log=0,1&range=0:10:7000&at=scale:2',
  three:
    'c=log10(metric.divisor.top)&c=max(d in divisors : d.cubic)&c=log10(volume)&c=log10(h11 - 9)&c=h11 > 9',
}

describe.skipIf(chromiumPath === null)('Explore, in a browser', { timeout: 240_000 }, () => {
  let server: TestServer
  let web: Listening
  let browser: Browser
  let watched: Watched
  let page: Page

  beforeAll(async () => {
    mkdirSync(shots, { recursive: true })
    server = await openTestServer()
    await loadEntries(
      server,
      bundledEntries('large', (id) => /^w(9-39|10-46|20-17)-newton/.test(id)),
    )
    web = await listening(server)
    browser = await launch()
    watched = await openPage(browser, 1440)
    page = watched.page
    page.setDefaultTimeout(120_000)
    await signIn(page)
  }, 240_000)

  afterAll(async () => {
    await browser?.close()
    await web?.close()
    await server?.close()
  })

  const signIn = async (on: Page) => {
    await on.goto(`${web.url}/sign-in`)
    await on.getByLabel('E-mail address').fill(address('investigator'))
    await on.getByLabel('Password').fill(password)
    await on.getByRole('button', { name: 'Sign in' }).click()
    await on.waitForURL('**/campaigns')
  }
  const explore = (query: string) =>
    `${web.url}/campaigns/${server.campaignId}/explore?scope=filter&size=100&${query}`
  const complete = (on: Page) => on.getByText(/^100 candidates on 3 polytopes\./).waitFor()

  it('draws columns as they are typed, selects by dragging, and leads to dossiers', async () => {
    await page.goto(explore('c=h11'))
    await complete(page)
    await page.getByRole('img', { name: /^h11 on the null sample: 100 values between 9 and 20/ }).waitFor()
    // A second column with a mistake says so; mended, it is drawn against the first.
    await page.getByRole('button', { name: 'Add a column' }).click()
    const second = page.getByRole('textbox', { name: 'Column 2' })
    await second.click()
    await page.keyboard.press('Control+A')
    await page.keyboard.type('log10(volum)')
    await page.getByRole('alert').getByText('volum', { exact: true }).first().waitFor()
    await page.keyboard.press('Escape')
    await page.keyboard.press('ArrowLeft')
    await page.keyboard.type('e')
    await page.keyboard.press('Escape')
    const scatter = page.getByRole('img', { name: /^log10\(volume\) against h11: 100 candidates/ })
    await scatter.waitFor()
    expect(new URL(page.url()).searchParams.getAll('c')).toEqual(['h11', 'log10(volume)'])
    // The right half: polytopes with the larger h11.
    const box = (await scatter.boundingBox())!
    await page.mouse.move(box.x + box.width * 0.6, box.y + 40)
    await page.mouse.down()
    await page.mouse.move(box.x + box.width - 20, box.y + box.height - 50, { steps: 5 })
    await page.mouse.up()
    const selected = page.getByRole('region', { name: 'Selected candidates' })
    await selected.waitFor()
    const cells = await selected.locator('tbody tr td:nth-child(4)').allInnerTexts()
    expect(new Set(cells)).toEqual(new Set(['20, 17']))
    const address = page.url()
    expect(address).toMatch(/range=0/)
    await selected.locator('tbody a').first().click()
    await page.waitForURL('**/candidates/*')
    await page.getByRole('heading', { level: 1 }).waitFor()
    // Everything is in the address.
    await page.goBack()
    await page.getByRole('region', { name: 'Selected candidates' }).waitFor()
    expect(page.url()).toBe(address)
  })

  it('exports the table, and hands a column over to a new target', async () => {
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('link', { name: 'Export table, CSV' }).click(),
    ])
    expect(download.suggestedFilename()).toBe('null-sample.csv')
    await page.getByLabel('By column').selectOption({ label: 'log10(volume)' })
    await page.getByRole('button', { name: 'Write a target from this' }).click()
    await page.waitForURL('**/targets/new')
    const rule = page.getByRole('textbox', { name: 'Scoring rule' })
    await rule.waitFor()
    expect(await rule.innerText()).toMatch(/score log10\(volume\)\s+report h11/)
    await page.getByText(/^No errors\./).waitFor()
    expect(watched.complaints).toEqual([])
  })

  it.each(views)('fits, is accessible and is quiet at %i px, %s', async (width, theme) => {
    const other = await openPage(browser, width, theme)
    other.page.setDefaultTimeout(120_000)
    await signIn(other.page)
    for (const [name, query] of Object.entries(shown)) {
      if (name !== 'two' && !everySize) continue
      await other.page.goto(explore(query))
      await complete(other.page)
      await other.page.waitForFunction(() => document.querySelectorAll('main td svg').length >= 9)
      if (everySize)
        await other.page.screenshot({ path: `${shots}explore-${name}-${width}-${theme}.png`, fullPage: true })
      const overflow = await other.page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      )
      expect(overflow, 'horizontal overflow in px').toBeLessThanOrEqual(0)
      const { violations } = await new AxeBuilder({ page: other.page })
        .options({
          runOnly: { type: 'tag', values: ['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'] },
          resultTypes: ['violations'],
        })
        .setLegacyMode(true)
        .analyze()
      expect(
        violations.map(
          ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 160)).join(' | ')}`,
        ),
      ).toEqual([])
    }
    expect(other.complaints).toEqual([])
    await other.page.context().close()
  })
})
