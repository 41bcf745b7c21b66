import { mkdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { AxeBuilder } from '@axe-core/playwright'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Browser, Page } from 'playwright-core'
import { evaluateInput } from '../../scoring/index.ts'
import { listening, type Listening } from '../server/support/listening.ts'
import { address, openTestServer, password, type TestServer } from '../server/support/testServer.ts'
import { chromiumPath, launch, openPage, type Theme, type Watched } from './browser.ts'

const shots = fileURLToPath(new URL('./screenshots/', import.meta.url))

const quintic = '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-1 -1 -1 -1'
const octic = '1 0 0 0\n0 1 0 0\n0 0 1 0\n0 0 0 1\n-2 -2 -2 -1\n-1 -1 -1 0'

/** Every width in both themes with ALL_SIZES=1, for looking at. */
const views: [width: number, theme: Theme][] =
  process.env.ALL_SIZES === '1'
    ? [380, 900, 1440].flatMap((width) =>
        (['light', 'dark'] as const).map((theme): [number, Theme] => [width, theme]),
      )
    : [[380, 'dark']]

describe.skipIf(chromiumPath === null)('imports, in a browser', { timeout: 120_000 }, () => {
  let server: TestServer
  let web: Listening
  let browser: Browser
  let watched: Watched
  let page: Page

  beforeAll(async () => {
    mkdirSync(shots, { recursive: true })
    server = await openTestServer()
    web = await listening(server)
    browser = await launch()
    watched = await openPage(browser, 1440)
    page = watched.page
    page.setDefaultTimeout(60_000)
    await signIn(page)
  }, 120_000)

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
  const campaign = () => `${web.url}/campaigns/${server.campaignId}`
  const dialog = () => page.getByRole('dialog')
  const shot = (name: string) => page.screenshot({ path: `${shots}imports-${name}.png`, fullPage: true })
  const open = async (tab: string) => {
    await page.goto(`${campaign()}/imported`)
    await page.getByRole('button', { name: 'Import candidates' }).click()
    await dialog().getByRole('tab', { name: tab }).click()
  }

  it('takes polytopes from a text', async () => {
    await open('Polytopes')
    await dialog().getByLabel('Points', { exact: true }).fill(`${octic}\n\n1 0 0 0\n0 1 0 0`)
    await dialog().getByRole('button', { name: 'Import', exact: true }).click()
    await dialog().getByRole('table', { name: 'Imported polytopes' }).waitFor()
    expect(await dialog().innerText()).toMatch(/1 polytope imported; 1 problem/)
    await shot('1-polytopes')
  })

  it('takes weight systems, a line each', async () => {
    await open('Weight systems')
    await dialog().getByLabel('Weights').fill('1 1 2 2 2\n1 1 1 6 9 # over the plane\n1 2 3')
    await dialog().getByRole('button', { name: 'Import', exact: true }).click()
    await dialog().getByRole('table', { name: 'Imported polytopes' }).waitFor()
    const report = await dialog().innerText()
    expect(report).toMatch(/2 polytopes imported, 1 of them known before; 1 problem/)
    expect(report).toContain('over the plane')
    expect(report).toContain('line 3')
    await shot('2-weights')
  })

  it('takes candidates from a text, recognising its format, and lists what is wrong by line', async () => {
    await open('Candidates')
    await dialog()
      .getByRole('textbox', { name: 'Candidates' })
      .fill(`candidate octic\nvertices\n${octic}\nheights 3 1 4 1 5 0\n\nheights 0 0 0 0 0 0\nas discussed\n`)
    await dialog()
      .getByText(/Recognised: text in sections, 2 candidates/)
      .waitFor()
    await dialog().getByLabel('Source (optional)').fill('notebook, p. 12')
    await shot('3-candidates')
    await dialog().getByRole('button', { name: 'Import', exact: true }).click()
    await dialog().getByRole('table', { name: 'Imported candidates' }).waitFor()
    const report = await dialog().innerText()
    expect(report).toMatch(/1 candidate imported; 1 problem/)
    expect(report).toContain('heights.not-fine')
    expect(report).toContain('line 11')
    expect(report).toContain('1 line passed over')
    await shot('4-report')
    await dialog().getByRole('button', { name: 'Back to the text' }).click()
    expect(await dialog().getByRole('textbox', { name: 'Candidates' }).inputValue()).toContain('heights')
  })

  it('asks about a matrix that can be read both ways, and goes on with the answer', async () => {
    await open('Candidates')
    await dialog()
      .getByRole('textbox', { name: 'Candidates' })
      .fill(`lifted points\n${quintic.replaceAll(/$/gm, ' 7')}`)
    await dialog().getByRole('button', { name: 'Import', exact: true }).click()
    await dialog().getByRole('heading', { name: 'Rows or columns?' }).waitFor()
    await shot('5-question')
    await dialog().getByRole('button', { name: 'One per row' }).click()
    await dialog().getByRole('table', { name: 'Imported candidates' }).waitFor()
  })

  it('takes candidates from a file', async () => {
    await open('Candidates')
    const inputs = [1, 2].map((seed) => ({
      weights: [3, 3, 4, 5, 7],
      side: 'newton',
      heights: { seed, noise: 0.4 },
    }))
    const text = JSON.stringify(inputs.map((input) => evaluateInput({ ...input, show: [] })))
    await dialog()
      .getByLabel('Or a file')
      .setInputFiles({ name: 'found.json', mimeType: 'application/json', buffer: Buffer.from(text) })
    await dialog().getByRole('button', { name: 'Import', exact: true }).click()
    await dialog().getByRole('table', { name: 'Imported candidates' }).waitFor()
    expect(await dialog().innerText()).toMatch(/2 candidates imported; no problems/)
    await dialog().getByRole('link', { name: 'To the imported candidates' }).click()
    await page.getByRole('table', { name: 'Imported candidates' }).waitFor()
    await page.getByText('4 candidates').waitFor()
    await shot('6-list')
  })

  it('ranks imported candidates by a target and lets one decide on them', async () => {
    const { page: api } = { page: page.request }
    const made = await api.post(`${web.url}/api/campaigns/${server.campaignId}/targets`, {
      headers: { origin: web.url },
      data: { name: 'Volumes', text: 'score volume\nreport h11' },
    })
    expect(made.status()).toBe(201)
    // Without a shortlist first: on the dossier, by the target one chooses there.
    await page.goto(`${campaign()}/imported`)
    await page.getByRole('link', { name: 'octic' }).click()
    await page.getByLabel('Score by the target').waitFor()
    await page.getByRole('button', { name: /^Undecided/ }).click()
    await page.getByRole('list', { name: /^Verdicts/ }).waitFor()
    await shot('9-dossier')
    await page.goto(`${campaign()}/imported`)
    await page.getByRole('button', { name: 'Make a shortlist' }).click()
    await dialog().getByLabel('Name').fill('From elsewhere')
    await shot('7-shortlist-dialog')
    await dialog()
      .getByRole('button', { name: /Score and make/ })
      .click()
    await page.getByRole('heading', { level: 1, name: 'From elsewhere' }).waitFor()
    await page.getByRole('table', { name: 'Candidates' }).waitFor()
    expect(await page.locator('main header').innerText()).toContain('4 candidates imported')
    await page.getByRole('button', { name: /^Reject/ }).click()
    await page.getByText('rejected', { exact: true }).first().waitFor()
    await shot('8-shortlist')
  })

  it.each(views)('fits and is accessible at %i px, %s', async (width, theme) => {
    const small = await openPage(browser, width, theme)
    await signIn(small.page)
    const fine = async (name: string) => {
      await small.page.screenshot({ path: `${shots}imports-${name}-${width}-${theme}.png`, fullPage: true })
      const overflow = await small.page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      )
      expect(overflow).toBeLessThanOrEqual(0)
      const { violations } = await new AxeBuilder({ page: small.page })
        .withTags(['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'])
        .analyze()
      expect(
        violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 160))}`),
      ).toEqual([])
    }
    await small.page.goto(`${campaign()}/imported`)
    await small.page.getByRole('table', { name: 'Imported candidates' }).waitFor()
    await fine('page')
    await small.page.getByRole('button', { name: 'Import candidates' }).click()
    await small.page.getByRole('dialog').getByText('Formats').click()
    await fine('dialog')
    await small.page.getByRole('textbox', { name: 'Candidates' }).fill(`${octic}\n\n3 1 4 1 5 0\n\n1 2\n`)
    await small.page.getByRole('button', { name: 'Import', exact: true }).click()
    await small.page.getByRole('dialog').getByRole('table').waitFor()
    await fine('report')
    expect(small.complaints).toEqual([])
    await small.page.context().close()
  })

  it('is quiet on the browser console all the way', () => {
    expect(watched.complaints).toEqual([])
  })
})
