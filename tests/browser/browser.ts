import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { chromium, type Browser, type Page } from 'playwright-core'

function findChromium(): string | null {
  const named = process.env.CHROMIUM_PATH
  if (named && existsSync(named)) return named
  for (const folder of (process.env.PATH ?? '').split(':')) {
    for (const name of ['chromium', 'chromium-browser']) {
      if (folder && existsSync(join(folder, name))) return join(folder, name)
    }
  }
  return null
}

/** Path of Debian's Chromium, or null: then the browser tests are reported as skipped. */
export const chromiumPath = findChromium()

export function launch(): Promise<Browser> {
  return chromium.launch({
    executablePath: chromiumPath ?? undefined,
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  })
}

export interface Watched {
  readonly page: Page
  /** Console errors and warnings, uncaught exceptions and failed requests of the page. */
  readonly complaints: string[]
}

export type Theme = 'light' | 'dark'

/** A page whose own complaints are collected; a test asserts that there are none. */
export async function openPage(
  browser: Browser,
  width: number,
  theme: Theme = 'light',
  height = 900,
): Promise<Watched> {
  const context = await browser.newContext({
    viewport: { width, height },
    colorScheme: theme,
    acceptDownloads: true,
    reducedMotion: 'reduce',
  })
  const page = await context.newPage()
  const complaints: string[] = []
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning')
      complaints.push(`${message.type()}: ${message.text()}`)
  })
  page.on('pageerror', (error) => complaints.push(`exception: ${error.message}`))
  return { page, complaints }
}
