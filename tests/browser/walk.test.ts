import { mkdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { type Browser, type Page } from 'playwright-core'
import { caution } from '../../shared/caution.ts'
import { startApplication, type Application } from './application.ts'
import { chromiumPath, launch, openPage, type Watched } from './browser.ts'

const shots = fileURLToPath(new URL('./screenshots/', import.meta.url))
const tourShots = fileURLToPath(new URL('./tour/', import.meta.url))

/** Vertices of the Newton polytope of the weights (3,4,5,6,7): (h11, h21) = (24, 9), not in the bundled library. */
const pasted = `-2 2 1 -1
-1 -1 0 -1
0 -1 -1 -1
0 -1 -1 2
0 -1 0 -1
0 -1 0 0
0 0 -1 1
0 0 0 1
0 0 1 -1
0 1 -1 -1
0 1 1 -1
1 0 -2 -1
1 0 -2 0
1 0 1 -1
1 0 1 0

1 0 0 0
0 1 0 0
0 0 1 0
0 0 0 1
-1 -1 -1 -2
`

const wrong = `# long axion range
require favourble
score log10(metric.divisor.top)
report volume, smallest = min(d in divisors : d.volume)
`

describe.skipIf(chromiumPath === null)(
  'from sign-in to a verdict, in a browser',
  { timeout: 180_000 },
  () => {
    let application: Application
    let browser: Browser
    let watched: Watched
    let page: Page

    beforeAll(async () => {
      mkdirSync(shots, { recursive: true })
      application = await startApplication()
      browser = await launch()
      watched = await openPage(browser, 1440)
      page = watched.page
      page.setDefaultTimeout(60_000)
    }, 180_000)

    afterAll(async () => {
      await browser?.close()
      await application?.stop()
    })

    const shot = (name: string) => page.screenshot({ path: `${shots}walk-${name}.png`, fullPage: true })

    /** The README's pictures are renewed on demand only, so that a test run leaves the tree as it was. */
    const tour = async (name: string) => {
      if (process.env.RENEW_TOUR === '1') await page.screenshot({ path: `${tourShots}${name}.png` })
    }

    afterEach(async ({ task }) => {
      if (task.result?.state === 'fail')
        await shot(`failed-${task.name.slice(0, 20).replaceAll(/\W+/g, '-')}`)
    })

    it('signs in with what the start printed', async () => {
      const email = /\S+@tessellary\.example(?=\s+lead)/.exec(application.greeting)?.[0]
      const password = /password: (.+)/.exec(application.greeting)?.[1]
      expect(email).toBeDefined()
      await page.goto(application.address)
      await page.getByLabel('E-mail address').fill(email!)
      await page.getByLabel('Password').fill('not the password')
      await page.getByRole('button', { name: 'Sign in' }).click()
      await page.getByRole('alert').waitFor()
      // The refused sign-in is the one failed request of the whole walk.
      expect(watched.complaints.splice(0)).toHaveLength(1)
      await page.getByLabel('Password').fill(password!.trim())
      await page.getByRole('button', { name: 'Sign in' }).click()
      await page.getByRole('heading', { level: 1 }).waitFor()
      await page.waitForURL('**/campaigns')
      await shot('1-campaigns')
    })

    it('imports a polytope by pasting its points, and says what is wrong with another', async () => {
      await page.getByRole('link', { name: 'Long axion ranges' }).first().click()
      await page.getByRole('heading', { level: 1, name: 'Long axion ranges' }).waitFor()
      await page.getByRole('link', { name: 'Library' }).first().click()
      await page.getByRole('button', { name: 'Import polytopes' }).click()
      await page.getByLabel('Points', { exact: true }).fill(pasted)
      await page.getByLabel('Name (optional)').fill('seven weights')
      await page.getByRole('button', { name: 'Import', exact: true }).click()
      const dialog = page.getByRole('dialog')
      await dialog.getByRole('table', { name: 'Imported polytopes' }).waitFor()
      await shot('2-import')
      const report = await dialog.innerText()
      expect(report).toContain('24')
      // The weights (1,1,1,1,2) stand in the second block, which is in the library.
      expect(report).toMatch(/yes|known|library/i)
      await page.keyboard.press('Escape')
      await dialog.waitFor({ state: 'hidden' })
      await tour('library')
    })

    it('shows where a rule is wrong, mends it in one click and previews it', async () => {
      await page.getByRole('link', { name: 'Targets' }).first().click()
      await page
        .getByRole('link', { name: /new target|write a target/i })
        .first()
        .click()
      await page.getByLabel('Name of the target').fill('Long range at seven weights')
      const editor = page.getByRole('textbox', { name: 'Scoring rule' })
      await editor.click()
      await page.keyboard.press('ControlOrMeta+a')
      await page.keyboard.insertText(wrong)
      const messages = page.getByRole('list', { name: 'Messages about the rule' })
      await messages.waitFor()
      expect(await messages.innerText()).toContain('favourble')
      expect(await messages.innerText()).toContain('2:9')
      await shot('3-rule-error')
      await messages.getByRole('button', { name: /favourable/ }).click()
      await page.getByText('No errors.').waitFor()
      await page
        .getByRole('img', { name: /Score on the null sample/ })
        .or(page.getByText('Score on the null sample'))
        .first()
        .waitFor()
      await page.getByText(/\d+ candidates\./).waitFor({ timeout: 120_000 })
      await shot('4-preview')
      await tour('target')
      await page.getByRole('button', { name: 'Save the target' }).click()
      await page.getByRole('heading', { level: 1, name: 'Long range at seven weights' }).waitFor()
    })

    it('starts a search on the imported polytope and watches it climb', async () => {
      await page.getByRole('link', { name: 'Search with it' }).click()
      await page.getByRole('heading', { level: 1, name: 'New search' }).waitFor()
      await page.getByLabel('All that match a filter').check()
      await page.getByLabel('Name, key or weights').fill('seven weights')
      // The second pasted polytope bears the name, too, when the bundled library had not come to it yet.
      await page.getByLabel('h11 from').fill('24')
      await page.getByText(/h11 24/).waitFor()
      await page.getByLabel('Budget, evaluations').fill('400')
      await page.getByLabel('Seed').fill('7')
      await page.getByLabel('Name (optional)').fill('Browser walk')
      await shot('5-new-search')
      await page.getByRole('button', { name: /Start the search/ }).click()
      await page.getByRole('heading', { level: 1, name: 'Browser walk' }).waitFor()
      await page
        .getByText(/^(running|finished)$/)
        .first()
        .waitFor()
      await page.getByText('finished', { exact: true }).first().waitFor({ timeout: 180_000 })
      await page
        .getByText(/400 of 400/)
        .first()
        .waitFor()
      await shot('6-search')
      await tour('search')
    })

    it('makes a shortlist and decides with one key', async () => {
      await page.getByRole('link', { name: 'Make a shortlist' }).click()
      await page.getByRole('heading', { level: 1, name: 'New shortlist' }).waitFor()
      await page.getByLabel('Name', { exact: true }).fill('First look')
      await page.getByRole('table', { name: 'The first of the list' }).waitFor()
      await shot('6-assembly')
      await page.getByRole('button', { name: /^Make the shortlist of \d+ candidates$/ }).click()
      await page.getByRole('heading', { level: 1, name: 'First look' }).waitFor()
      const rows = page.getByRole('row')
      await rows.filter({ hasText: 'undecided' }).nth(5).waitFor()
      expect(await rows.count()).toBeGreaterThan(10)
      await page.keyboard.press('r')
      await rows.filter({ hasText: 'rejected' }).first().waitFor()
      expect(await page.locator('body').innerText()).toContain(caution)
      await shot('7-shortlist')
      await tour('shortlist')
    })

    it('opens the dossier, whose numbers obey the geometry, and verifies with a reason', async () => {
      await page.getByRole('link', { name: 'Rank 2, open the dossier' }).click()
      await page.getByText('Score and verdict').waitFor()
      await page.getByText('Spectrum').first().waitFor()
      await shot('8-dossier')
      await tour('dossier')
      const key = /candidates\/([0-9a-f]{32})/.exec(page.url())![1]
      const answer = await page.request.get(`${application.address}/api/candidates/${key}`)
      const geometry = (await answer.json()) as {
        polytope: { h11: number; h21: number; euler: number }
        secondChern: number[]
        intersections: [number, number, number, number][]
        divisors: { chi: number; cube: number }[]
      }
      expect([geometry.polytope.h11, geometry.polytope.h21]).toEqual([24, 9])
      // Noether: 12 chi(O_D) = 2 D^3 + c2 . D for every divisor.
      geometry.divisors.forEach((divisor, i) => {
        expect(12 * divisor.chi).toBe(2 * divisor.cube + geometry.secondChern[i])
      })
      const distinct = geometry.intersections.filter(([i, j, k]) => i < j && j < k)
      const sum = (values: number[]) => values.reduce((total, value) => total + value, 0)
      expect(sum(distinct.map(([, , , value]) => value)) - sum(geometry.secondChern)).toBe(
        geometry.polytope.euler,
      )
      const spectra = await page.request.get(`${application.address}/api/candidates/${key}/spectra`)
      const { divisorSpectrum } = (await spectra.json()) as { divisorSpectrum: number[] }
      expect(divisorSpectrum).toHaveLength(24)

      await page.getByRole('button', { name: /^Verify/ }).click()
      const dialog = page.getByRole('dialog')
      await dialog.getByRole('button', { name: 'Verify by override' }).click()
      await dialog.getByText(/needs a reason/).waitFor()
      await dialog
        .getByLabel('Reason and evidence')
        .fill('Intersection numbers compared with a hand calculation.')
      await dialog.getByRole('button', { name: 'Verify by override' }).click()
      await page.getByText('verified by override').first().waitFor()
      await shot('9-verdict')
    })

    it('certifies the candidate from its dossier, and verifies without an override', async () => {
      await page.getByRole('button', { name: /^Certify for/ }).click()
      const certificate = page.getByRole('article', { name: /^Certificate/ })
      await certificate.waitFor({ timeout: 120_000 })
      await certificate.getByText('passed').first().waitFor()
      const table = await certificate.getByRole('table', { name: 'Comparisons' }).innerText()
      expect(table).toContain('agrees')
      expect(table).not.toContain('FAILS')
      await certificate.scrollIntoViewIfNeeded()
      await shot('10-certificate')
      await tour('certificate')
      const [file] = await Promise.all([
        page.waitForEvent('download'),
        certificate.getByRole('link', { name: 'Download JSON' }).click(),
      ])
      const whole = JSON.parse(readFileSync(await file.path(), 'utf8')) as { schema: string; passed: boolean }
      expect(whole).toMatchObject({ schema: 'tessellary.certificate/1', passed: true })

      await page.getByRole('button', { name: /^Verify/ }).click()
      const dialog = page.getByRole('dialog', { name: 'Verdict: verified' })
      await dialog.getByRole('button', { name: 'Verify', exact: true }).click()
      await dialog.waitFor({ state: 'hidden' })
      const verdicts = page.getByRole('list', { name: 'Verdicts, newest first' }).getByRole('listitem')
      await verdicts.nth(1).waitFor()
      expect(await verdicts.first().innerText()).not.toContain('override')
      expect(await verdicts.nth(1).innerText()).toContain('verified by override')
    })

    it('certifies selected candidates of the shortlist, after which one key verifies', async () => {
      await page.getByRole('link', { name: 'First look' }).first().click()
      await page.getByRole('heading', { level: 1, name: 'First look' }).waitFor()
      await page.getByRole('checkbox', { name: 'Select rank 3', exact: true }).click()
      await page.getByRole('checkbox', { name: 'Select rank 5', exact: true }).click({ modifiers: ['Shift'] })
      await page.getByRole('button', { name: 'Certify the 3 selected' }).click()
      const rows = page.getByRole('row')
      const passed = rows.filter({ hasText: 'passed' })
      await passed.nth(3).waitFor({ timeout: 120_000 })
      const waiting = rows.filter({ hasText: 'undecided' }).filter({ hasText: 'passed' }).first()
      const rank = (await waiting.getByRole('cell').nth(1).innerText()).trim()
      await waiting.click()
      await page
        .getByRole('group', { name: 'Candidate in hand' })
        .getByText(`Rank ${rank}`, { exact: true })
        .waitFor()
      await page.keyboard.press('v')
      await rows
        .filter({ hasText: /verified(?! by override)/ })
        .nth(1)
        .waitFor()
      await shot('11-bulk')
    })

    it('filters the library, collects what it finds, and searches in the collection', async () => {
      await page.getByRole('link', { name: 'Library' }).first().click()
      await page.getByLabel('Name, key or weights').fill('seven weights')
      await page.getByLabel('Filter by another number').selectOption('Edges')
      await page.getByLabel('Edges from').fill('20')
      const conditions = page.getByRole('list', { name: 'Conditions in force' })
      await conditions.getByText('Edges ≥ 20').waitFor()
      await page.getByText('1 polytope matches the filter').waitFor()
      await page.getByRole('button', { name: 'Collect these' }).click()
      await page.getByLabel('Name of the collection').fill('walked')
      await page.getByRole('button', { name: 'Put in 1 polytope' }).click()
      await page.getByText('“walked” holds 1 polytope.').waitFor()

      await page.getByRole('button', { name: 'Clear the filter' }).click()
      await page.getByRole('combobox', { name: 'Collection' }).selectOption('walked (1 polytope)')
      await conditions.getByText('in “walked”').waitFor()
      await page.getByText('1 polytope matches the filter').waitFor()
      await shot('12-collection')
      await page.getByRole('link', { name: /^seven weights/ }).click()
      await page.getByRole('heading', { level: 1, name: /^seven weights/ }).waitFor()
      // The candidates of the search that was walked through.
      await page.getByRole('table', { name: 'Candidates met in your campaigns' }).waitFor()
      await page.getByRole('table', { name: 'Two-dimensional reflexive sections' }).waitFor()
      await shot('13-polytope')

      await page.getByRole('link', { name: 'Searches' }).first().click()
      await page.getByRole('link', { name: 'New search' }).first().click()
      await page.getByRole('radio', { name: 'A collection' }).check()
      await page.getByRole('combobox', { name: 'Collection' }).selectOption('walked (1 polytope)')
      await page.getByText(/1 polytope, h11 24/).waitFor()
      await page.getByLabel('Budget, evaluations').fill('20')
      await page.getByLabel('Name (optional)').fill('In the collection')
      await page.getByRole('button', { name: /Start the search/ }).click()
      await page.getByRole('heading', { level: 1, name: 'In the collection' }).waitFor()
      await page
        .getByText(/the collection “walked”/)
        .first()
        .waitFor()
    })

    it('says nothing on the browser console all the way', () => {
      expect(watched.complaints).toEqual([])
    })
  },
)
