import { mkdtempSync, readFileSync, rmSync, statSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { isLoopback, readConfig, sessionSecret, StartError } from '../../server/config.ts'

describe('configuration', () => {
  let folder: string
  beforeEach(() => {
    folder = mkdtempSync(join(tmpdir(), 'tessellary-config-'))
  })
  afterEach(() => rmSync(folder, { recursive: true }))

  it('has defaults for local use', () => {
    const config = readConfig({})
    expect(config).toMatchObject({
      port: 4280,
      host: '127.0.0.1',
      production: false,
      baseUrl: 'http://127.0.0.1:4280',
      trustProxy: 0,
    })
    expect(config.dataDirectory.endsWith('/var')).toBe(true)
  })

  it('treats an empty variable as not set', () => {
    expect(readConfig({ PORT: '' }).port).toBe(4280)
  })

  it.each([
    [{ PORT: 'http' }, /PORT.*http/],
    [{ PORT: '70000' }, /PORT/],
    [{ WORKERS: '0' }, /WORKERS/],
    [{ NODE_ENV: 'staging' }, /NODE_ENV.*staging/],
    [{ SESSION_SECRET: 'short' }, /SESSION_SECRET.*32/],
    [{ PUBLIC_URL: 'ftp://x.example' }, /PUBLIC_URL/],
  ])('refuses %o and names it', (environment, message) => {
    expect(() => readConfig(environment)).toThrow(StartError)
    expect(() => readConfig(environment)).toThrow(message)
  })

  it('names every wrong variable at once', () => {
    expect(() => readConfig({ PORT: 'x', WORKERS: 'y' })).toThrow(/PORT[^]*WORKERS/)
  })

  it('makes a local secret once, readable by the owner only', () => {
    const config = readConfig({ DATA_DIR: folder })
    const secret = sessionSecret(config)
    expect(secret).toMatch(/^[0-9a-f]{64}$/)
    expect(sessionSecret(config)).toBe(secret)
    const file = join(folder, 'session-secret')
    expect(readFileSync(file, 'utf8')).toBe(secret)
    expect(statSync(file).mode & 0o777).toBe(0o600)
  })

  it('does not start in production without a secret', () => {
    const config = readConfig({ NODE_ENV: 'production', DATA_DIR: folder })
    expect(() => sessionSecret(config)).toThrow(/SESSION_SECRET/)
  })

  it.each([
    ['127.0.0.1', true],
    ['127.8.8.8', true],
    ['localhost', true],
    ['::1', true],
    ['0.0.0.0', false],
    ['127.0.0.1.example.org', false],
    ['192.168.1.4', false],
  ])('knows that %s is loopback: %s', (host, expected) => {
    expect(isLoopback(host)).toBe(expected)
  })
})
