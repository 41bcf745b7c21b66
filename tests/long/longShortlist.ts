/**
 * A shortlist of 5,000 real candidates, drawn from searches over many polytopes, in the built application; prints the
 * longest task on the page's thread while one scrolls, sorts, filters, decides and changes the view: by the clock (Long
 * Tasks API), which counts the waits of a busy machine as well, and in processor time (the browser's trace).
 *
 *   npm run build && node --import tsx tests/long/longShortlist.ts [folder to keep the data in]
 *
 * With a folder the list is made once and used again.
 */
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'
import type { Page } from 'playwright-core'
import { startApplication } from '../browser/application.ts'
import { launch, openPage } from '../browser/browser.ts'
import { signInAs } from '../browser/signIn.ts'

const rule = `require favourable label "favourable"
score log10(metric.divisor.top)
report volume, smallest = min(d in divisors : d.volume), k3 = count(d in divisors : d.k3), rigid = count(d in divisors : d.rigid)
hit log10(metric.divisor.top) >= -4
`
const size = 5_000
const kept = process.argv[2]
const folder = kept ? resolve(kept) : mkdtempSync(join(tmpdir(), 'tessellary-long-list-'))
mkdirSync(folder, { recursive: true })
const note = join(folder, 'list.txt')

const application = await startApplication({ DATA_DIR: folder })
const browser = await launch()
try {
  const { page, complaints } = await openPage(browser, 1440)
  await signInAs(page, application, 'lead')
  if (!existsSync(note)) writeFileSync(note, await makeList(page))
  const place = readFileSync(note, 'utf8')
  await page.goto(`${application.address}${place}`)
  await page.getByRole('table', { name: 'Candidates' }).waitFor({ timeout: 120_000 })
  await measure(page)
  for (const complaint of complaints) process.stdout.write(`complaint: ${complaint}\n`)
} finally {
  await browser.close()
  await application.stop()
  if (!kept) rmSync(folder, { recursive: true, force: true })
}

/** Through the API, as the signed-in lead; returns the list's address. */
async function makeList(page: Page): Promise<string> {
  const api = async <Answer>(method: 'get' | 'post', path: string, data?: object): Promise<Answer> => {
    const answer = await page.request[method](`${application.address}/api${path}`, {
      data,
      headers: { origin: application.address },
      timeout: 600_000,
    })
    if (!answer.ok()) throw new Error(`${method} ${path}: ${answer.status()} ${await answer.text()}`)
    return (await answer.json()) as Answer
  }
  const [{ id: campaign }] = await api<{ id: string }[]>('get', '/campaigns')
  const base = `/campaigns/${campaign}`
  while ((await api<{ loading: object | null }>('get', '/polytopes/hodge')).loading !== null) {
    await new Promise((done) => setTimeout(done, 1_000))
  }
  const target = await api<{ versions: { id: string }[] }>('post', `${base}/targets`, {
    name: 'Long list',
    text: rule,
  })
  const searches: string[] = []
  for (let seed = 1; seed <= 15; seed++) {
    const { id } = await api<{ id: string }>('post', `${base}/searches`, {
      name: `Random ${seed}`,
      targetVersionId: target.versions[0].id,
      scope: { kind: 'filter', filter: { h11Min: 6, h11Max: 40 } },
      method: 'random',
      budget: 600,
      seed,
      islands: 1,
      keep: 500,
      surrogate: false,
    })
    searches.push(id)
  }
  for (const id of searches) {
    for (;;) {
      const { state } = await api<{ state: string }>('get', `${base}/searches/${id}`)
      if (state === 'finished') break
      if (state === 'failed') throw new Error(`search ${id} failed`)
      await new Promise((done) => setTimeout(done, 1_000))
    }
  }
  const list = await api<{ id: string; size: number }>('post', `${base}/shortlists`, {
    name: 'Five thousand',
    searchIds: searches,
    size,
  })
  process.stdout.write(`a list of ${list.size} candidates\n`)
  return `${base}/shortlists/${list.id}`
}

/** A task of a thread, as the browser's trace has it: microseconds on the clock, and of processor time. */
interface TracedTask {
  readonly name: string
  readonly ph: string
  readonly pid: number
  readonly tid: number
  readonly dur?: number
  readonly tdur?: number
  readonly args?: { readonly name?: string }
}

async function measure(page: Page): Promise<void> {
  await page.evaluate(() => {
    const seen: number[] = []
    Object.assign(window, { longTasks: seen })
    new PerformanceObserver((list) => {
      for (const { duration } of list.getEntries()) seen.push(duration)
    }).observe({ type: 'longtask' })
  })
  const inspector = await page.context().newCDPSession(page)
  const traced: TracedTask[] = []
  inspector.on('Tracing.dataCollected', ({ value }) => traced.push(...(value as unknown as TracedTask[])))
  const settled = () =>
    page.evaluate(() => new Promise((done) => requestIdleCallback(() => setTimeout(done, 100))))
  const during = async (what: string, work: () => Promise<void>) => {
    await settled()
    await page.evaluate(() => (window as unknown as { longTasks: number[] }).longTasks.splice(0))
    traced.length = 0
    await inspector.send('Tracing.start', { transferMode: 'ReportEvents', categories: 'toplevel,__metadata' })
    await work()
    await settled()
    const complete = new Promise((done) => inspector.once('Tracing.tracingComplete', done))
    await inspector.send('Tracing.end')
    await complete
    const onClock = await page.evaluate(() => (window as unknown as { longTasks: number[] }).longTasks)
    const threads = new Set(
      traced.flatMap(({ name, args, pid, tid }) =>
        name === 'thread_name' && args?.name === 'CrRendererMain' ? [`${pid} ${tid}`] : [],
      ),
    )
    const worked = traced.flatMap(({ name, ph, pid, tid, tdur }) =>
      ph === 'X' && name.endsWith('RunTask') && threads.has(`${pid} ${tid}`) ? [(tdur ?? 0) / 1000] : [],
    )
    const line = (values: readonly number[]) =>
      `longest ${String(Math.round(values.reduce((most, value) => Math.max(most, value), 0))).padStart(4)} ms, ${String(values.filter((value) => value > 50).length).padStart(3)} above 50`
    process.stdout.write(
      `${what.padEnd(42)} by the clock: ${line(onClock)}; processor time: ${line(worked)}\n`,
    )
  }
  const table = page.getByRole('group', { name: 'Candidates, scrolls' })
  await table.scrollIntoViewIfNeeded()
  await table.hover()
  const scroll = async (times: number, by: number) => {
    for (let at = 0; at < times; at++) {
      await page.mouse.wheel(0, by)
      await page.evaluate(() => new Promise((done) => requestAnimationFrame(done)))
    }
  }
  await during('scrolling, 100 turns of the wheel', () => scroll(100, 120))
  await during('scrolling fast, 50 turns of 1,200 pixels', () => scroll(50, 1_200))
  await during('sorting by score', () => page.getByRole('button', { name: 'Score', exact: true }).click())
  await during('sorting by volume', () => page.getByRole('button', { name: 'volume', exact: true }).click())
  await during('filtering by a text, four keys', async () => {
    await page.getByLabel('Polytope or key').pressSequentially('r5-1')
  })
  await during('lifting the filter', () => page.getByLabel('Polytope or key').fill(''))
  await page.getByRole('group', { name: 'Candidate in hand' }).waitFor()
  await during('twenty steps with j', async () => {
    await table.focus()
    for (let at = 0; at < 20; at++) await page.keyboard.press('j')
  })
  await during('ten rejections with r', async () => {
    for (let at = 0; at < 10; at++) await page.keyboard.press('r')
  })
  await during('taking them back with z', async () => {
    for (let at = 0; at < 10; at++) await page.keyboard.press('z')
  })
  await during('selecting twenty with Shift and arrow', async () => {
    for (let at = 0; at < 20; at++) await page.keyboard.press('Shift+ArrowDown')
  })
  await during('opening the scatter', () => page.getByRole('button', { name: 'Scatter' }).click())
  await during('brushing over half of it', async () => {
    const chart = page.locator('svg[data-chart][role=img]').first()
    const box = await chart.boundingBox()
    if (!box) throw new Error('no chart')
    await page.mouse.move(box.x + 80, box.y + 40)
    await page.mouse.down()
    await page.mouse.move(box.x + box.width / 2, box.y + 300, { steps: 10 })
    await page.mouse.up()
  })
  await during('letting the selection go', () =>
    page.getByRole('button', { name: 'Let go of the selection' }).click(),
  )
  await during('closing the scatter', () => page.getByRole('button', { name: 'Close the scatter' }).click())
  await during('changing to pictures', () => page.getByRole('button', { name: 'Pictures' }).click())
  await page.getByRole('group', { name: 'Pictures of the candidates, scrolls' }).hover()
  await during('scrolling pictures, 50 turns', () => scroll(50, 240))
}
