// Runs before every npm script with Node built-ins only: brings a fresh clone to the point where the script can run.
//   --build    also builds client and server when a source file is newer than the last build
//   --browser  also looks for Chromium, and installs Debian's where that is allowed
//   --quiet    prints nothing on standard output (headless commands own it)
import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('../..', import.meta.url))
const flags = new Set(process.argv.slice(2))
const say = (text) => process.stderr.write(`${text}\n`)

function run(command, args, options = {}) {
  const result = spawnSync(command, args, {
    cwd: root,
    stdio: ['ignore', flags.has('--quiet') ? 2 : 'inherit', 'inherit'],
    ...options,
  })
  if (result.status !== 0) {
    say(`setup: "${command} ${args.join(' ')}" failed${result.error ? `: ${result.error.message}` : ''}`)
    process.exit(1)
  }
}

function onPath(name) {
  return (process.env.PATH ?? '').split(':').some((folder) => folder && existsSync(join(folder, name)))
}

function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number)
  if (major < 20 || (major === 20 && minor < 19)) {
    say(`setup: Node ${process.versions.node} found; Tessellary needs Node 20.19 or later.`)
    process.exit(1)
  }
}

/** Native packages are compiled on install, so ask for the tools before two minutes have gone by. */
function checkCompiler() {
  const missing = [
    ['g++', 'g++'],
    ['make', 'make'],
    ['python3', 'python3'],
  ].filter(([command]) => !onPath(command))
  if (missing.length === 0) return
  say(
    `setup: missing ${missing.map(([command]) => command).join(', ')}, needed to compile SQLite for Node. On Debian:`,
  )
  say(`  apt-get install -y ${missing.map(([, name]) => name).join(' ')}`)
  process.exit(1)
}

/** node_modules is current when it was installed from this very lock file. */
function installPackages() {
  const lock = createHash('sha256')
    .update(readFileSync(join(root, 'package-lock.json')))
    .digest('hex')
  const stamp = join(root, 'node_modules', '.installed-from')
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === lock) return
  checkCompiler()
  say('setup: installing packages (about three minutes the first time) ...')
  run('npm', ['ci', '--no-progress'])
  writeFileSync(stamp, lock)
}

function newestChange(paths) {
  let newest = 0
  const visit = (path) => {
    if (!existsSync(path)) return
    const stat = statSync(path)
    if (!stat.isDirectory()) newest = Math.max(newest, stat.mtimeMs)
    else for (const name of readdirSync(path)) visit(join(path, name))
  }
  for (const path of paths) visit(join(root, path))
  return newest
}

/** The grammar's parser is generated, never committed. */
function generateParser() {
  const target = join(root, 'scoring/rules/generated/parser.ts')
  if (existsSync(target) && statSync(target).mtimeMs > newestChange(['scoring/rules/rule.grammar'])) return
  mkdirSync(join(root, 'scoring/rules/generated'), { recursive: true })
  run('npm', ['run', '--silent', 'grammar'])
}

function buildApplication() {
  const stamp = join(root, 'dist', '.built')
  const sources = [
    'src',
    'server',
    'shared',
    'scoring',
    'index.html',
    'vite.config.ts',
    'tailwind.config.ts',
    'package.json',
  ]
  if (existsSync(stamp) && statSync(stamp).mtimeMs > newestChange(sources)) return
  say('setup: building ...')
  run('npm', ['run', '--silent', 'build'])
}

function findBrowser() {
  const named = process.env.CHROMIUM_PATH
  if (named && existsSync(named)) return
  if (onPath('chromium') || onPath('chromium-browser')) return
  const mayInstall = process.getuid?.() === 0 && onPath('apt-get')
  if (mayInstall) {
    say("setup: installing Debian's chromium for the browser tests ...")
    const quiet = { stdio: ['ignore', 'ignore', 'inherit'] }
    spawnSync('apt-get', ['update', '-qq'], quiet)
    spawnSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'chromium'], quiet)
  }
  if (!onPath('chromium')) {
    say('setup: NO CHROMIUM FOUND. THE BROWSER TESTS WILL BE SKIPPED. On Debian: apt-get install -y chromium')
  }
}

checkNode()
installPackages()
generateParser()
if (flags.has('--build')) buildApplication()
if (flags.has('--browser')) findBrowser()
