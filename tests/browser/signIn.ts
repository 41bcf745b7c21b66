import type { Page } from 'playwright-core'
import type { Application } from './application.ts'

/** Signs in as a member of the demo team, with the address and password that the start printed. */
export async function signInAs(page: Page, application: Application, role: string): Promise<void> {
  const email = new RegExp(`\\S+@tessellary\\.example(?=\\s+${role})`).exec(application.greeting)?.[0]
  const password = /password: (.+)/.exec(application.greeting)?.[1]
  if (email === undefined || password === undefined)
    throw new Error(`No demo sign-in in:\n${application.greeting}`)
  await page.goto(`${application.address}/sign-in`)
  await page.getByLabel('E-mail address').fill(email)
  await page.getByLabel('Password').fill(password.trim())
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL('**/campaigns')
}
