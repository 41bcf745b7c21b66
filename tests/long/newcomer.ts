/**
 * A newcomer's way to a shortlist of their own, in a real browser, with every action counted and timed. An action is
 * a click, a key or key chord, or a field that is filled.
 *   node --import tsx tests/long/newcomer.ts FOLDER                       clones this repository into an empty folder, npm start
 *   node --import tsx tests/long/newcomer.ts ADDRESS E-MAIL PASSWORD      an application that is running
 * Exits 1 when the way takes more than 25 actions or ends without a shortlist.
 */
import { spawn, spawnSync } from 'node:child_process'
import { once } from 'node:events'
import { existsSync, readdirSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { type Page } from 'playwright-core'
import { launch, openPage } from '../browser/browser.ts'

const most = 25
const root = fileURLToPath(new URL('../..', import.meta.url))
const say = (line: string) => process.stdout.write(`${line}\n`)
const seconds = (since: number) => `${((performance.now() - since) / 1000).toFixed(1)} s`

interface Running {
  readonly address: string
  readonly email: string
  readonly password: string
  stop(): Promise<unknown>
}

/** What a person does who has only the address of the repository, and reads what the start prints. */
async function fromClone(folder: string): Promise<Running> {
  if (existsSync(folder) && readdirSync(folder).length > 0) throw new Error(`${folder} is not empty.`)
  const began = performance.now()
  const clone = spawnSync('git', ['clone', '--quiet', root, folder], { stdio: 'inherit' })
  if (clone.status !== 0) throw new Error('The clone failed.')
  const port = process.env.PORT ?? '4290'
  const child = spawn('npm', ['start'], {
    cwd: folder,
    env: { ...process.env, PORT: port, DATA_DIR: join(folder, 'var') },
    stdio: ['ignore', 'pipe', 'inherit'],
    detached: true,
  })
  let printed = ''
  child.stdout.on('data', (chunk: Buffer) => (printed += chunk.toString()))
  const ended = once(child, 'exit').then(([code]) => {
    throw new Error(`npm start ended with status ${String(code)}:\n${printed}`)
  })
  const ready = (async () => {
    while (!/password: .+\n/.test(printed)) await once(child.stdout, 'data')
  })()
  await Promise.race([ready, ended])
  ended.catch(() => undefined)
  say(`clone and npm start until the sign-in is printed: ${seconds(began)}`)
  return {
    address: /http:\/\/\S+/.exec(printed)?.[0] ?? '',
    email: /\S+@tessellary\.example(?=\s+lead)/.exec(printed)?.[0] ?? '',
    password: /password: (.+)/.exec(printed)?.[1]?.trim() ?? '',
    stop: async () => {
      if (child.exitCode === null && child.pid) process.kill(-child.pid, 'SIGTERM')
      await once(child, 'exit').catch(() => undefined)
    },
  }
}

const [place = '', email = '', password = ''] = process.argv.slice(2)
if (place === '' || (/^http/.test(place) && password === '')) {
  say('Give an empty folder, or an address with e-mail and password.')
  process.exit(2)
}
const running: Running = /^http/.test(place)
  ? { address: place, email, password, stop: () => Promise.resolve() }
  : await fromClone(resolve(place))

let actions = 0
/** One action of the person, and what they wait for before they can go on. */
async function act(
  what: string,
  action: () => Promise<unknown>,
  until?: () => Promise<unknown>,
): Promise<void> {
  const began = performance.now()
  await action()
  await until?.()
  say(`${String(++actions).padStart(3)}  ${what.padEnd(58)} ${seconds(began).padStart(8)}`)
}

async function walk(page: Page): Promise<void> {
  const heading = (name: string | RegExp) => page.getByRole('heading', { level: 1, name })
  await page.goto(running.address)
  await page.getByLabel('E-mail address').waitFor()
  const began = performance.now()
  await act('fill in the e-mail address', () => page.getByLabel('E-mail address').fill(running.email))
  await act('fill in the password', () => page.getByLabel('Password').fill(running.password))
  await act(
    'sign in',
    () => page.keyboard.press('Enter'),
    () => heading('Campaigns').waitFor(),
  )

  await act(
    'New campaign',
    () => page.getByRole('button', { name: 'New campaign' }).click(),
    () => page.getByRole('dialog').waitFor(),
  )
  const campaign = 'A campaign of one’s own'
  await act('fill in its name', () => page.getByRole('dialog').getByLabel('Name').fill(campaign))
  await act(
    'create it',
    () => page.keyboard.press('Enter'),
    () => heading(campaign).waitFor(),
  )

  await act(
    'first step: Write a target',
    () => page.getByRole('link', { name: 'Write a target' }).click(),
    () => heading('New target').waitFor(),
  )
  await act(
    'a starter: Long axion range',
    () => page.getByRole('button', { name: /^Long axion range/ }).click(),
    () => page.getByText(/^No errors\./).waitFor(),
  )
  await act(
    'save the target',
    () => page.keyboard.press('Control+s'),
    () => heading('Long axion range').waitFor(),
  )

  await act(
    'Search with it',
    () => page.getByRole('link', { name: 'Search with it' }).click(),
    () => heading('New search').waitFor(),
  )
  const start = page.getByRole('button', { name: /^Start the search/ })
  await start.waitFor()
  // What the scope holds is counted; until the first polytopes of it are loaded there is nothing to search in.
  await page
    .getByRole('status')
    .getByText(/polytopes?/)
    .first()
    .waitFor()
  await act(
    'start the search, all as proposed',
    () => start.click(),
    () =>
      page
        .getByText(/^(running|queued|finished)$/)
        .first()
        .waitFor(),
  )
  const list = page.getByRole('link', { name: 'Make a shortlist', exact: true })
  const waiting = performance.now()
  await list.waitFor()
  say(`     wait for the first finds: ${seconds(waiting)}`)
  await act(
    'Make a shortlist',
    () => list.click(),
    () => page.getByRole('button', { name: /^Make the shortlist of \d+/ }).waitFor(),
  )
  await act(
    'make it, named as proposed',
    () => page.getByRole('button', { name: /^Make the shortlist of \d+/ }).click(),
    () => page.getByRole('table', { name: 'Candidates' }).waitFor(),
  )
  await page.getByRole('row').filter({ hasText: 'undecided' }).first().waitFor()
  say(`     a shortlist after ${actions} actions, ${seconds(began)}`)
  await act(
    'reject the first candidate with one key',
    () => page.keyboard.press('r'),
    () => page.getByRole('row').filter({ hasText: 'rejected' }).first().waitFor(),
  )
}

const browser = await launch()
let failed: unknown = null
try {
  const { page, complaints } = await openPage(browser, 1440)
  page.setDefaultTimeout(180_000)
  try {
    await walk(page)
  } catch (error) {
    await page
      .screenshot({ path: join(root, 'tests/browser/screenshots/newcomer-stuck.png') })
      .catch(() => {})
    throw error
  }
  for (const complaint of complaints) say(`console: ${complaint}`)
} catch (error) {
  failed = error
} finally {
  await browser.close()
  await running.stop()
}
if (failed) say(String(failed))
else say(`${actions} actions, at most ${most} allowed`)
process.exit(failed !== null || actions > most ? 1 : 0)
