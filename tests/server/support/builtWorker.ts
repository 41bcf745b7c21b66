import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { basename, join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import ts from 'typescript'

const root = fileURLToPath(new URL('../../..', import.meta.url))

/**
 * Job options with the built worker file, which starts in a third of the time that the source takes through a loader;
 * none where a source file is newer than the build, which `npm test` makes first.
 */
export const builtWorker: { readonly worker?: URL } = isCurrent()
  ? { worker: pathToFileURL(join(root, 'dist/node/server/worker.js')) }
  : {}

/** A worker file of the tests that wraps the worker, beside the build where that is current. */
export function builtVariant(source: URL): URL {
  if (!builtWorker.worker) return source
  const folder = join(root, 'dist/node/tests')
  const file = join(folder, basename(fileURLToPath(source)).replace(/\.ts$/, `-${process.pid}.js`))
  const { outputText } = ts.transpileModule(readFileSync(source, 'utf8'), {
    compilerOptions: { module: ts.ModuleKind.ESNext, target: ts.ScriptTarget.ES2022 },
  })
  mkdirSync(folder, { recursive: true })
  writeFileSync(file, outputText.replace(/'(\.\.\/)+((scoring|shared|server)\/[^']+)\.ts'/g, "'../$2.js'"))
  return pathToFileURL(file)
}

function isCurrent(): boolean {
  const stamp = join(root, 'dist/.built')
  if (!existsSync(stamp)) return false
  const built = statSync(stamp).mtimeMs
  return ['scoring', 'shared', 'server'].every((folder) =>
    readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile())
      .every(({ parentPath, name }) => statSync(join(parentPath, name)).mtimeMs < built),
  )
}
