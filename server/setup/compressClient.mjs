// Puts a .br and a .gz beside every text file of the built client; the server hands them out as they are.
import { readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { brotliCompressSync, constants, gzipSync } from 'node:zlib'

const folder = fileURLToPath(new URL('../../dist/client/assets', import.meta.url))

for (const name of readdirSync(folder)) {
  if (!/\.(js|css|svg)$/.test(name)) continue
  const content = readFileSync(join(folder, name))
  const { BROTLI_PARAM_MODE, BROTLI_MODE_TEXT, BROTLI_PARAM_SIZE_HINT } = constants
  const params = { [BROTLI_PARAM_MODE]: BROTLI_MODE_TEXT, [BROTLI_PARAM_SIZE_HINT]: content.length }
  for (const [ending, small] of [
    ['br', brotliCompressSync(content, { params })],
    ['gz', gzipSync(content, { level: 9 })],
  ]) {
    if (small.length < content.length) writeFileSync(join(folder, `${name}.${ending}`), small)
  }
}
