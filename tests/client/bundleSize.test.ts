import { existsSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { gunzipSync, brotliDecompressSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'

const client = fileURLToPath(new URL('../../dist/client/', import.meta.url))
const built = existsSync(`${client}.vite/manifest.json`)

interface Chunk {
  file: string
  imports?: string[]
}

/** Everything a page needs before it can be drawn: its own chunk, and what that imports statically. */
function filesOf(manifest: Record<string, Chunk>, entries: readonly string[]): string[] {
  const seen = new Set<string>()
  const visit = (name: string) => {
    if (seen.has(name)) return
    seen.add(name)
    for (const next of manifest[name]?.imports ?? []) visit(next)
  }
  entries.forEach(visit)
  return [...seen].map((name) => manifest[name]!.file)
}

const limit = 150 * 1024
const shell = 'src/components/shell/Shell.tsx'
const pages: [name: string, entries: string[]][] = [
  ['sign-in', ['src/routes/sign-in/SignInPage.tsx']],
  ['campaign', [shell, 'src/routes/campaign/CampaignPage.tsx']],
]

describe.skipIf(!built)('the built client', () => {
  const manifest = built
    ? (JSON.parse(readFileSync(`${client}.vite/manifest.json`, 'utf8')) as Record<string, Chunk>)
    : {}

  it.each(pages)('the %s page needs at most 150 KB of compressed JavaScript', (_name, entries) => {
    const files = filesOf(manifest, ['index.html', ...entries])
    const bytes = files.map((file) => {
      const small = `${client}${file}.br`
      return readFileSync(existsSync(small) ? small : client + file).length
    })
    expect(files.length).toBeGreaterThan(3)
    expect(bytes.reduce((sum, one) => sum + one, 0)).toBeLessThanOrEqual(limit)
  })

  it('holds the same beside every compressed file', () => {
    const { file } = manifest['index.html']!
    const whole = readFileSync(client + file)
    expect(brotliDecompressSync(readFileSync(`${client}${file}.br`)).equals(whole)).toBe(true)
    expect(gunzipSync(readFileSync(`${client}${file}.gz`)).equals(whole)).toBe(true)
  })
})
