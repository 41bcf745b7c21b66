import { once } from 'node:events'
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { request, type IncomingMessage } from 'node:http'
import { type AddressInfo, type Server } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { brotliCompressSync, gzipSync } from 'node:zlib'
import express from 'express'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { serveClient } from '../../server/http/clientFiles.ts'

const folder = `${mkdtempSync(join(tmpdir(), 'tessellary-client-'))}/`
const script = 'export const a = 1\n'.repeat(200)
let server: Server
let port = 0

beforeAll(async () => {
  mkdirSync(`${folder}assets`)
  writeFileSync(`${folder}index.html`, '<!doctype html>')
  writeFileSync(`${folder}assets/a.js`, script)
  writeFileSync(`${folder}assets/a.js.br`, brotliCompressSync(script))
  writeFileSync(`${folder}assets/a.js.gz`, gzipSync(script))
  writeFileSync(`${folder}assets/b.js`, 'export {}\n')
  const app = express()
  serveClient(app, folder)
  const listening = app.listen(0, '127.0.0.1')
  server = listening
  await once(listening, 'listening')
  port = (listening.address() as AddressInfo).port
})
afterAll(() => {
  server.close()
  rmSync(folder, { recursive: true })
})

/** As it comes over the wire; fetch would decode it. */
async function get(path: string, encodings: string) {
  const sent = request({ host: '127.0.0.1', port, path, headers: { 'accept-encoding': encodings } }).end()
  const [answer] = (await once(sent, 'response')) as [IncomingMessage]
  const pieces: Buffer[] = []
  for await (const piece of answer) pieces.push(piece as Buffer)
  const { statusCode, headers } = answer
  return { status: statusCode, headers, body: Buffer.concat(pieces) }
}

describe('files of the client', () => {
  it.each([
    ['gzip, deflate, br', 'br', brotliCompressSync(script)],
    ['gzip', 'gzip', gzipSync(script)],
    ['', undefined, Buffer.from(script)],
    ['br;q=0, identity', undefined, Buffer.from(script)],
  ])('come as the browser takes them: %s', async (accepted, encoding, bytes) => {
    const answer = await get('/assets/a.js', accepted)
    expect(answer.status).toBe(200)
    expect(answer.headers['content-encoding']).toBe(encoding)
    expect(answer.headers['content-type']).toMatch(/^(text|application)\/javascript/)
    expect(answer.headers.vary).toContain('Accept-Encoding')
    expect(answer.headers['cache-control']).toContain('immutable')
    expect(answer.body.equals(bytes)).toBe(true)
  })

  it('come as they are where no smaller one lies beside them, and are missed where there is none', async () => {
    const answer = await get('/assets/b.js', 'br')
    expect([answer.status, answer.headers['content-encoding']]).toEqual([200, undefined])
    expect((await get('/assets/../../a.js', 'br')).headers['content-encoding']).toBeUndefined()
    expect((await get('/assets/c.js', 'br')).status).toBe(404)
  })
})
