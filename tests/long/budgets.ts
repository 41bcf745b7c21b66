/**
 * What a first visit loads and how long a change of page takes, measured in the browser against the build:
 *   npm run build && node --import tsx tests/long/budgets.ts
 * Prints the figures beside their limits and exits 1 where one is missed.
 */
import { type Page } from 'playwright-core'
import { startApplication } from '../browser/application.ts'
import { launch, openPage } from '../browser/browser.ts'
import { signInAs } from '../browser/signIn.ts'

const scriptLimit = 150 * 1024
const changeLimit = 100
const rounds = 5

const application = await startApplication()
const browser = await launch()
let missed = 0

const say = (line: string) => process.stdout.write(`${line}\n`)

function tell(what: string, value: number, limit: number, unit: string): void {
  if (value > limit) missed++
  say(`${value > limit ? 'MISSED' : 'ok    '}  ${what}: ${value.toFixed(1)} ${unit} (limit ${limit} ${unit})`)
}

interface Load {
  readonly bytes: number
  readonly files: number
}

/**
 * Opens a page; the functions it returns say what scripts came over the wire before the page's own data, and what
 * has come by now.
 */
async function firstLoad(page: Page, address: string, data: RegExp, done: () => Promise<unknown>) {
  const needed: Promise<number>[] = []
  const ahead: Promise<number>[] = []
  const early = new Set<unknown>()
  let complete = false
  page.on('request', (request) => {
    if (!complete) early.add(request)
  })
  page.on('response', (response) => {
    if (data.test(response.url())) complete = true
  })
  page.on('requestfinished', (request) => {
    if (request.resourceType() !== 'script') return
    const size = request.sizes().then(({ responseBodySize }) => responseBodySize)
    ;(early.has(request) ? needed : ahead).push(size)
  })
  const sum = async (sizes: readonly Promise<number>[]): Promise<Load> => {
    const all = await Promise.all(sizes)
    return { bytes: all.reduce((total, one) => total + one, 0), files: all.length }
  }
  await page.goto(address)
  await done()
  return { before: () => sum(needed), byNow: () => sum([...needed, ...ahead]) }
}

const fetched = (page: Page, part: string) =>
  page.waitForFunction(
    (name) => performance.getEntriesByType('resource').some((entry) => entry.name.includes(name)),
    part,
  )

/** Nothing on the page is waited for. */
const settled = (page: Page) =>
  page.waitForFunction(
    () => document.querySelector('main [aria-busy="true"], main [role="status"] .animate-pulse') === null,
  )

/** Follows a link of the main navigation; milliseconds until the page it leads to stands in a frame. */
async function follow(page: Page, link: string, heading: string): Promise<number> {
  await page.evaluate((name) => {
    const links = [...document.querySelectorAll<HTMLAnchorElement>('nav[aria-label="Main"] a')]
    performance.mark('followed')
    links.find(({ textContent }) => textContent === name)?.click()
  }, link)
  const time = await page.waitForFunction(
    (title) => {
      if (document.querySelector('h1')?.textContent !== title) return false
      const [mark] = performance.getEntriesByName('followed').slice(-1)
      return performance.now() - (mark?.startTime ?? 0)
    },
    heading,
    { polling: 'raf' },
  )
  return Number(await time.jsonValue())
}

try {
  const first = await openPage(browser, 1440)
  const entrance = await firstLoad(first.page, `${application.address}/sign-in`, /no data/, () =>
    first.page.getByLabel('E-mail address').waitFor(),
  )
  const signIn = await entrance.byNow()
  tell(`scripts of the sign-in page (${signIn.files} files)`, signIn.bytes / 1024, scriptLimit / 1024, 'KB')
  await signInAs(first.page, application, 'lead')
  await first.page.locator('main table a').first().click()
  await first.page.getByRole('heading', { name: 'Members' }).waitFor()
  const campaign = first.page.url()
  const storageState = await first.page.context().storageState()
  await first.page.context().close()

  const context = await browser.newContext({ storageState, viewport: { width: 1440, height: 900 } })
  const page = await context.newPage()
  const scripts = await firstLoad(page, campaign, /\/api\/campaigns\/[^/]+$/, () =>
    page.getByRole('heading', { name: 'Members' }).waitFor(),
  )
  const drawn = await scripts.before()
  tell(`scripts of the campaign page (${drawn.files} files)`, drawn.bytes / 1024, scriptLimit / 1024, 'KB')
  await fetched(page, 'ActionPalette')
  say(
    `        with what is fetched ahead once the page rests: ${((await scripts.byNow()).bytes / 1024).toFixed(1)} KB`,
  )

  const title = (await page.locator('h1').textContent()) ?? ''
  const ways: [link: string, heading: string][] = [
    ['Targets', 'Targets'],
    ['Searches', 'Searches'],
    ['Shortlists', 'Shortlists'],
    ['Library', 'Library'],
    [title, title],
  ]
  // Once, so that code and data of every page are there.
  for (const [link, heading] of ways) {
    await follow(page, link, heading)
    await settled(page)
  }
  const times = new Map<string, number[]>()
  for (let round = 0; round < rounds; round++) {
    for (const [link, heading] of ways) {
      const list = times.get(heading) ?? []
      times.set(heading, [...list, await follow(page, link, heading)])
    }
  }
  for (const [heading, list] of times) {
    const sorted = [...list].sort((a, b) => a - b)
    const median = sorted[Math.floor(sorted.length / 2)] ?? NaN
    tell(`change to “${heading}”, median of ${list.length}`, median, changeLimit, 'ms')
  }
} finally {
  await browser.close()
  await application.stop()
}
process.exit(missed === 0 ? 0 : 1)
