import { mkdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { AxeBuilder } from '@axe-core/playwright'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Browser, Page } from 'playwright-core'
import { startApplication, type Application } from './application.ts'
import { chromiumPath, launch, openPage, type Theme, type Watched } from './browser.ts'
import { signInAs } from './signIn.ts'

const shots = fileURLToPath(new URL('./screenshots/', import.meta.url))

/** Every width in both themes with ALL_SIZES=1, with pictures to look at; otherwise the widths that break first. */
const everySize = process.env.ALL_SIZES === '1'
const views: [width: number, theme: Theme][] = everySize
  ? [380, 900, 1440].flatMap((width) =>
      (['light', 'dark'] as const).map((theme): [number, Theme] => [width, theme]),
    )
  : [
      [380, 'light'],
      [1440, 'dark'],
    ]

const pages = [
  'campaigns',
  'campaign',
  'library',
  'polytope',
  'targets',
  'target',
  'searches',
  'new-search',
  'search',
  'shortlists',
  'new-shortlist',
  'shortlist',
  'candidate',
  'reference',
] as const

interface SearchRow {
  id: string
  targetId: string
  state: string
}

describe.skipIf(chromiumPath === null)('every page, in a browser', { timeout: 240_000 }, () => {
  let application: Application
  let browser: Browser
  const addresses = new Map<string, string>()

  beforeAll(async () => {
    mkdirSync(shots, { recursive: true })
    application = await startApplication()
    browser = await launch()
    const { page } = await openPage(browser, 1440)
    await signInAs(page, application, 'lead')
    const read = async <T>(path: string): Promise<T> =>
      (await (await page.request.get(`${application.address}/api${path}`)).json()) as T
    // The demo search runs for real after the first start and ends in a shortlist; its page shows when.
    const [{ id: campaign }] = await read<{ id: string }[]>('/campaigns')
    await page.goto(`${application.address}/campaigns/${campaign}/shortlists`)
    await page.locator('main table a').first().waitFor({ timeout: 240_000 })
    const detail = await read<{ searchList: SearchRow[]; shortlistList: { id: string }[] }>(
      `/campaigns/${campaign}`,
    )
    const [search] = detail.searchList
    const [shortlist] = detail.shortlistList
    const { rows } = await read<{ rows: { candidateKey: string; polytopeKey: string }[] }>(
      `/campaigns/${campaign}/shortlists/${shortlist.id}`,
    )
    const base = `/campaigns/${campaign}`
    addresses
      .set('campaigns', '/campaigns')
      .set('campaign', base)
      .set('library', '/library')
      .set('polytope', `/library/${rows[0].polytopeKey}`)
      .set('targets', `${base}/targets`)
      .set('target', `${base}/targets/${search.targetId}`)
      .set('searches', `${base}/searches`)
      .set('new-search', `${base}/searches/new?target=${search.targetId}`)
      .set('search', `${base}/searches/${search.id}`)
      .set('shortlists', `${base}/shortlists`)
      .set('new-shortlist', `${base}/shortlists/new?search=${search.id}`)
      .set('shortlist', `${base}/shortlists/${shortlist.id}`)
      .set('candidate', `/candidates/${rows[0].candidateKey}?campaign=${campaign}&shortlist=${shortlist.id}`)
      .set('reference', '/reference')
    await page.context().close()
  }, 300_000)

  afterAll(async () => {
    await browser?.close()
    await application?.stop()
  })

  describe.each(views)('at %i px, %s', (width, theme) => {
    let watched: Watched
    let page: Page

    beforeAll(async () => {
      watched = await openPage(browser, width, theme)
      page = watched.page
      await signInAs(page, application, 'lead')
    })
    afterAll(() => page?.context().close())

    it.each(pages)('%s fits, is accessible and is quiet', async (name) => {
      await page.goto(application.address + addresses.get(name)!)
      await page.getByRole('heading', { level: 1 }).waitFor()
      // A page is complete when nothing says that it is still being loaded; the event stream stays open for ever.
      await page.waitForFunction(() => document.querySelector('main [aria-busy="true"]') === null)
      if (everySize) await page.screenshot({ path: `${shots}${name}-${width}-${theme}.png`, fullPage: true })
      const overflow = await page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      )
      expect(overflow, 'horizontal overflow in px').toBeLessThanOrEqual(0)
      // Typeset formulas are KaTeX's own markup, thousands of nodes on the reference page.
      const { violations } = await new AxeBuilder({ page })
        .exclude('.katex')
        .options({
          runOnly: { type: 'tag', values: ['wcag2a', 'wcag2aa', 'wcag21aa', 'wcag22aa'] },
          // What passed is a megabyte that nobody reads.
          resultTypes: ['violations'],
        })
        // In one piece, without a second page to gather results of frames: there are none, and it takes half the time.
        .setLegacyMode(true)
        .analyze()
      expect(
        violations.map(
          ({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 160)).join(' | ')}`,
        ),
      ).toEqual([])
      expect(watched.complaints).toEqual([])
    })
  })
})
