import { mkdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { AxeBuilder } from '@axe-core/playwright'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Browser, Page } from 'playwright-core'
import type { Application } from './application.ts'
import { chromiumPath, launch, openPage, type Theme, type Watched } from './browser.ts'
import { openDemoApplication } from './demoApplication.ts'
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
  'explore',
  'library',
  'polytope',
  'targets',
  'target',
  'searches',
  'new-search',
  'search',
  'compare',
  'shortlists',
  'new-shortlist',
  'shortlist',
  'candidate',
  'two-candidates',
  'reference',
] as const

interface SearchRow {
  id: string
  targetId: string
  state: string
}

const pick = ({ targetVersionId, scope }: Record<'targetVersionId' | 'scope', unknown>) => ({
  targetVersionId,
  scope,
})

describe.skipIf(chromiumPath === null)('every page, in a browser', { timeout: 240_000 }, () => {
  let application: Application
  let browser: Browser
  const addresses = new Map<string, string>()

  beforeAll(async () => {
    mkdirSync(shots, { recursive: true })
    application = await openDemoApplication()
    browser = await launch()
    const { page } = await openPage(browser, 1440)
    await signInAs(page, application, 'lead')
    const read = async <T>(path: string): Promise<T> =>
      (await (await page.request.get(`${application.address}/api${path}`)).json()) as T
    const [{ id: campaign }] = await read<{ id: string }[]>('/campaigns')
    const detail = await read<{ searchList: SearchRow[]; shortlistList: { id: string }[] }>(
      `/campaigns/${campaign}`,
    )
    const [search] = detail.searchList
    const [shortlist] = detail.shortlistList
    // A second search, to compare with: what it is asked to do is what the first one was.
    const asked = await read<Record<'targetVersionId' | 'scope', unknown>>(
      `/campaigns/${campaign}/searches/${search.id}`,
    )
    const begun = await page.request.post(`${application.address}/api/campaigns/${campaign}/searches`, {
      headers: { origin: application.address },
      data: { ...pick(asked), name: 'By chance', method: 'random', budget: 20, seed: 1, islands: 5 },
    })
    const { id: second } = (await begun.json()) as { id: string }
    await page.goto(`${application.address}/campaigns/${campaign}/searches/${second}`)
    await page.getByText('finished', { exact: true }).waitFor({ timeout: 240_000 })
    const { rows } = await read<{ rows: { candidateKey: string; polytopeKey: string }[] }>(
      `/campaigns/${campaign}/shortlists/${shortlist.id}`,
    )
    const base = `/campaigns/${campaign}`
    addresses
      .set('campaigns', '/campaigns')
      .set('campaign', base)
      .set(
        'explore',
        `${base}/explore?polytopes=${rows[0].polytopeKey}&size=100&c=log10(metric.divisor.top)&c=max(d in divisors : d.cubic)&c=h11`,
      )
      .set('library', '/library')
      .set('polytope', `/library/${rows[0].polytopeKey}`)
      .set('targets', `${base}/targets`)
      .set('target', `${base}/targets/${search.targetId}`)
      .set('searches', `${base}/searches`)
      .set('new-search', `${base}/searches/new?target=${search.targetId}`)
      .set('search', `${base}/searches/${search.id}`)
      .set('compare', `${base}/searches/compare?with=${search.id},${second}&settings=all`)
      .set('shortlists', `${base}/shortlists`)
      .set('new-shortlist', `${base}/shortlists/new?search=${search.id}`)
      .set('shortlist', `${base}/shortlists/${shortlist.id}`)
      .set('candidate', `/candidates/${rows[0].candidateKey}?campaign=${campaign}&shortlist=${shortlist.id}`)
      .set(
        'two-candidates',
        `/candidates/compare?with=${rows[0].candidateKey},${rows[1].candidateKey}&campaign=${campaign}`,
      )
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
      // Hundreds of entries of one make: those of one search stand for them.
      if (name === 'reference') await page.getByRole('searchbox').fill('rigid')
      const audit = new AxeBuilder({ page }).exclude('.katex')
      const { violations } = await audit
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

  it('goes from sign-in to a verdict by the keyboard alone', async () => {
    const { page, complaints } = await openPage(browser, 1440)
    const { keyboard } = page
    /** Tab by tab to what has this name; the focus is always somewhere one can see. */
    const tabTo = async (name: string | RegExp) => {
      for (let step = 0; step < 60; step += 1) {
        await keyboard.press('Tab')
        const focused = page.locator(':focus')
        await expect.poll(() => focused.count()).toBe(1)
        const text = await focused.evaluate(
          (element) => element.getAttribute('aria-label') ?? element.textContent,
        )
        if (typeof name === 'string' ? text?.trim() === name : name.test(text ?? '')) return
      }
      throw new Error(`Tab does not lead to ${String(name)}.`)
    }
    const [, email] = /(\S+@tessellary\.example)\s+reviewer/.exec(application.greeting) ?? []
    const [, password] = /password: (.+)/.exec(application.greeting) ?? []

    await page.goto(`${application.address}/sign-in`)
    // The address has the focus from the start.
    await page.getByLabel('E-mail address').and(page.locator(':focus')).waitFor()
    await keyboard.type(email)
    await keyboard.press('Tab')
    await keyboard.type(password.trim())
    await keyboard.press('Enter')
    await page.waitForURL('**/campaigns')
    await tabTo('Long axion ranges')
    await keyboard.press('Enter')
    await page.getByRole('heading', { level: 1, name: 'Long axion ranges' }).waitFor()

    await keyboard.press('Control+k')
    await page.getByRole('dialog').waitFor()
    await keyboard.type('first run, best')
    await page
      .getByRole('option', { name: /First run, best 40/ })
      .first()
      .waitFor()
    await keyboard.press('Enter')
    await page.getByRole('heading', { level: 1, name: 'First run, best 40' }).waitFor()

    const decision = page.getByLabel('Candidate in hand')
    await keyboard.press('j')
    await decision.getByText('Rank 2').waitFor()
    await keyboard.press('r')
    // It is rejected, and the next one is in hand.
    await decision.getByText('Rank 3').waitFor()
    const rows = (word: string) =>
      page.getByRole('row').filter({ has: page.getByText(word, { exact: true }) })
    await rows('rejected').waitFor()
    await keyboard.press('v')
    await page.getByRole('dialog', { name: 'Verify by override' }).waitFor()
    await page.locator('textarea:focus').waitFor()
    await keyboard.type('compared with the list of the first paper by hand')
    await tabTo('Verify by override')
    await keyboard.press('Enter')
    await rows('verified by override').waitFor()
    await keyboard.press('?')
    await page.getByRole('dialog').getByText('Triage').first().waitFor()
    await keyboard.press('Escape')
    await keyboard.press('z')
    await rows('verified by override').waitFor({ state: 'detached' })
    await keyboard.press('o')
    await page.getByRole('heading', { level: 1, name: /^Candidate / }).waitFor()
    expect(complaints).toEqual([])
    await page.context().close()
  })

  it('lays searches side by side that were ticked in the list', async () => {
    const { page, complaints } = await openPage(browser, 1440)
    await signInAs(page, application, 'reader')
    await page.goto(application.address + addresses.get('searches')!)
    const boxes = page.locator('main table').getByRole('checkbox')
    await boxes.nth(1).waitFor()
    await boxes.nth(0).check()
    await boxes.nth(1).check()
    await page.getByRole('link', { name: 'Compare (2)' }).click()
    await page.getByRole('heading', { name: 'Searches side by side' }).waitFor()
    const figures = page.getByRole('table', { name: 'Figures of the searches' })
    await figures.getByRole('rowheader', { name: 'Best score' }).waitFor()
    const settings = page.getByRole('table', { name: 'Settings of the searches' })
    await settings.getByRole('rowheader', { name: 'Seed' }).waitFor()
    expect(await settings.getByRole('rowheader').allTextContents()).toEqual([
      'Method',
      'Budget',
      'Islands',
      'Seed',
    ])
    await page.getByRole('radio', { name: '100' }).click()
    await page.waitForURL(/best=100/)
    const shared = page.getByRole('table', { name: 'Candidates shared among the best 100' })
    await shared.getByRole('row').nth(1).filter({ hasText: '(20)' }).waitFor()
    await page.getByRole('button', { name: 'Show “Best score so far” as a table' }).click()
    await page.getByRole('table', { name: 'Best score over evaluations' }).waitFor()
    await page.getByRole('button', { name: 'Show “Best score so far” as a drawing' }).click()
    await page.locator('main canvas').waitFor()
    expect(complaints).toEqual([])
    await page.context().close()
  })
})
