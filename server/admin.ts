import { join } from 'node:path'
import { z } from 'zod'
import { readConfig, StartError } from './config.ts'
import { openDataSource } from './data-source.ts'
import { Refusal } from './problems.ts'
import { createAccount } from './services/accounts.ts'
import { WriteLock } from './writeLock.ts'

const usage =
  'Usage: npm run admin -- create EMAIL\n  makes an account and prints its one-time set-up link.\n'

/** Works on the database of DATA_DIR, also beside a running server. Returns the exit status. */
async function main(words: readonly string[]): Promise<number> {
  const [command, address] = words
  if (command !== 'create' || address === undefined || words.length !== 2) {
    process.stderr.write(usage)
    return 2
  }
  const email = z.email().max(200).safeParse(address)
  if (!email.success) {
    process.stderr.write(`admin: "${address}" is not an e-mail address.\n`)
    return 2
  }
  const config = readConfig(process.env)
  const source = await openDataSource(join(config.dataDirectory, 'tessellary.sqlite'))
  try {
    const { token, expiresAt } = await createAccount(new WriteLock(source), email.data)
    process.stdout.write(`${config.baseUrl}/set-up?token=${token}\n`)
    process.stderr.write(`The link works once, until ${expiresAt}.\n`)
    return 0
  } finally {
    await source.destroy()
  }
}

try {
  process.exitCode = await main(process.argv.slice(2))
} catch (error) {
  if (!(error instanceof StartError || error instanceof Refusal)) throw error
  process.stderr.write(`admin: ${error.message}\n`)
  process.exitCode = 1
}
