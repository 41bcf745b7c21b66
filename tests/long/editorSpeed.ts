/**
 * How long typing in a rule of 200 lines blocks the page, and how soon a preview of 200 null candidates answers, in the
 * browser against the build, once the library is loaded (four minutes):
 *
 *     npm run build && node --import tsx tests/long/editorSpeed.ts [folder to keep the data in]
 *
 * Prints the figures beside their limits and exits 1 where one is missed. A preview is timed from the change of the text
 * to its answer on the page, the pause for typing included.
 */
import type { Page } from 'playwright-core'
import { startApplication } from '../browser/application.ts'
import { launch, openPage } from '../browser/browser.ts'
import { signInAs } from '../browser/signIn.ts'

const blockedLimit = 50
const folder = process.argv[2]
const application = await startApplication(folder ? { DATA_DIR: folder } : {})
const browser = await launch()
let missed = 0

function tell(what: string, value: number, limit: number): void {
  if (value > limit) missed++
  process.stdout.write(
    `${value > limit ? 'MISSED' : 'ok    '}  ${what}: ${value.toFixed(0)} ms (limit ${limit} ms)\n`,
  )
}

const lines = [
  '# a long rule',
  'at volume 1000',
  'require favourable',
  ...Array.from({ length: 90 }, (_, n) => {
    const before = n > 0 ? `name${n - 1} + ` : ''
    return `let name${n} = ${before}log10(1 + sum(d in divisors where d.volume > ${n} : d.volume^2))`
  }),
  ...Array.from({ length: 90 }, (_, n) => `require name${n} >= -${n} label "label ${n}"`),
  'score name89',
  ...Array.from({ length: 16 }, (_, n) => `report c${n} = name${n} * 2`),
]

declare global {
  interface Window {
    blocked: { from: number; duration: number }[]
  }
}

const replace = async (page: Page, text: string) => {
  await page.getByRole('textbox', { name: 'Scoring rule' }).click()
  await page.keyboard.press('ControlOrMeta+a')
  await page.keyboard.insertText(text)
}

/** Types; the longest task on the page's thread meanwhile, in ms; 0 where none reached 50. */
async function typed(page: Page, text: string): Promise<number> {
  // What began before the first key is told late, and does not count.
  const begun = await page.evaluate(() => performance.now())
  await page.keyboard.type(text, { delay: 60 })
  await page.getByText(/^No errors\./).waitFor()
  const blocked = await page.evaluate(() => window.blocked)
  return Math.max(0, ...blocked.filter(({ from }) => from >= begun).map(({ duration }) => duration))
}

try {
  const { page } = await openPage(browser, 1440)
  page.setDefaultTimeout(400_000)
  await signInAs(page, application, 'lead')
  const read = async <T>(path: string): Promise<T> =>
    (await (await page.request.get(`${application.address}/api${path}`)).json()) as T
  await page.goto(`${application.address}/library`)
  await page.locator('main table').waitFor()
  await page.getByText('still being loaded').waitFor({ state: 'hidden' })
  const [{ id }] = await read<{ id: string }[]>('/campaigns')

  await page.goto(`${application.address}/campaigns/${id}/targets/new`)
  await page.getByText(/^No errors\./).waitFor()
  await page.evaluate(() => {
    window.blocked = []
    new PerformanceObserver((list) =>
      list
        .getEntries()
        .forEach(({ startTime, duration }) => window.blocked.push({ from: startTime, duration })),
    ).observe({ type: 'longtask' })
  })
  await replace(page, lines.join('\n'))
  await page.getByText(/^No errors\./).waitFor()
  await page.keyboard.press('ControlOrMeta+End')
  tell(
    'typing at the end of 200 lines',
    await typed(page, '\nreport extra = metric.divisor.top + sum(d in divisors : d.volume)  # at speed'),
    blockedLimit,
  )
  await page.keyboard.press('ControlOrMeta+Home')
  await page.keyboard.press('End')
  tell(
    'typing at the beginning of 200 lines',
    await typed(page, '\nrequire h11 > 2 and h21 > 3 label "typed in the beginning"'),
    blockedLimit,
  )

  const answers = page
    .getByRole('tabpanel')
    .getByRole('status')
    .filter({ hasText: /\d+ candidates\./ })
  const answer = async (rule: string): Promise<number> => {
    const begun = performance.now()
    const asked = page.waitForRequest((one) => one.url().endsWith('/previews') && one.method() === 'POST')
    await replace(page, rule)
    await asked
    await answers.waitFor()
    return performance.now() - begun
  }
  for (const [low, high] of [
    [1, 4],
    [20, 30],
  ]) {
    const scope = page.locator('details', { hasText: 'Null sample of' }).first()
    if (!(await page.getByLabel('h11 from').isVisible())) await scope.locator('summary').click()
    await page.getByLabel('h11 from').fill(String(low))
    await page.getByLabel('h11 to').fill(String(high))
    await answer('score h11')
    const topology = 'score count(d in divisors : d.rigid) + count(t in triples : t.number == 1)'
    const metric = 'score log10(metric.divisor.top)\nreport volume'
    const where = `h11 ${low} to ${high}`
    tell(`preview of a topological rule, ${where}`, await answer(topology), 1_000)
    tell(`preview of a metric rule, ${where}`, await answer(metric), 3_000)
    tell(`the topological rule again, ${where}`, await answer(topology), 1_000)
  }
} finally {
  await browser.close()
  await application.stop()
}
process.exit(missed > 0 ? 1 : 0)
