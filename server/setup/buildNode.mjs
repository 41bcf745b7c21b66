// Compiles scoring/, shared/ and server/ to plain JavaScript in dist/node and copies the data files beside them.
import { spawnSync } from 'node:child_process'
import { cpSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))
const out = join(root, 'dist', 'node')
rmSync(out, { recursive: true, force: true })
const result = spawnSync('npx', ['tsc', '-p', 'server/setup/tsconfig.node.json'], {
  cwd: root,
  stdio: 'inherit',
})
if (result.status !== 0) process.exit(result.status ?? 1)
cpSync(join(root, 'server/library/data'), join(out, 'server/library/data'), { recursive: true })
writeFileSync(join(out, 'package.json'), '{ "type": "module" }\n')
// The last step of a build: tells the set-up script that dist/ is newer than the sources.
writeFileSync(join(root, 'dist', '.built'), '')
