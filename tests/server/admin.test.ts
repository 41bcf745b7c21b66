import { execFile } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openDataSource } from '../../server/data-source.ts'
import { setUpAccount } from '../../server/services/accounts.ts'
import { WriteLock } from '../../server/writeLock.ts'

const root = fileURLToPath(new URL('../..', import.meta.url))

let folder: string
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'tessellary-admin-'))
})
afterAll(() => rmSync(folder, { recursive: true }))

interface Ended {
  readonly status: number
  readonly stdout: string
  readonly stderr: string
}

const admin = (...words: string[]) =>
  new Promise<Ended>((resolve) => {
    const env = {
      ...process.env,
      DATA_DIR: folder,
      PUBLIC_URL: 'https://tessellary.example',
      NODE_ENV: 'production',
    }
    execFile(
      process.execPath,
      ['--import', 'tsx', 'server/admin.ts', ...words],
      { cwd: root, env },
      (error, stdout, stderr) => resolve({ status: error ? Number(error.code) : 0, stdout, stderr }),
    )
  })

describe('npm run admin', () => {
  it('prints a set-up link that works', async () => {
    const { status, stdout } = await admin('create', 'First@Tests.example')
    expect(status).toBe(0)
    const [, token] = /^https:\/\/tessellary\.example\/set-up\?token=([\w-]{43})\n$/.exec(stdout) ?? []
    expect(token).toBeDefined()
    const source = await openDataSource(join(folder, 'tessellary.sqlite'))
    try {
      const input = { token: token ?? '', name: 'First', password: 'a long enough password' }
      expect(await setUpAccount(new WriteLock(source), input)).toMatchObject({ email: 'first@tests.example' })
    } finally {
      await source.destroy()
    }
    const again = await admin('create', 'first@tests.example')
    expect(again.status).toBe(1)
    expect(again.stdout).toBe('')
    expect(again.stderr).toMatch(/already an account/)
  })

  it.each([[[]], [['create']], [['remove', 'a@tests.example']], [['create', 'no address']]])(
    'explains itself when it is called with %j',
    async (words) => {
      const { status, stdout, stderr } = await admin(...words)
      expect(status).toBe(2)
      expect(stdout).toBe('')
      expect(stderr).toMatch(/Usage|not an e-mail address/)
    },
  )
})
