import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import { z } from 'zod'
import type { OpenServer } from '../../../server/start.ts'

type Opened = Pick<OpenServer, 'context'>

const fileSchema = z.object({
  about: z.string(),
  polytopes: z.array(z.looseObject({ id: z.string(), vertices: z.array(z.array(z.number())) })),
})

const data = (name: string) => new URL(`../../../server/library/data/polytopes-${name}.json`, import.meta.url)

/** The bundled polytopes of a file whose name passes. */
export function bundledEntries(file: 'small' | 'large' | 'h11-5', wanted: (id: string) => boolean) {
  const { polytopes } = fileSchema.parse(JSON.parse(readFileSync(data(file), 'utf8')))
  return polytopes.filter(({ id }) => wanted(id))
}

/** Writes entries as a bundled file of its own into the server's folder. */
export function bundledFile({ context }: Opened, name: string, polytopes: readonly object[]): URL {
  const path = join(context.config.dataDirectory, name)
  writeFileSync(path, JSON.stringify({ about: 'a sample for a test', polytopes }))
  return pathToFileURL(path)
}

/** Loads entries into the library of a test server, as the first start loads the bundled files. */
export async function loadEntries(
  server: Opened,
  polytopes: readonly object[],
  name = 'sample.json',
): Promise<void> {
  const { library } = server.context
  await library.load(await library.open([bundledFile(server, name, polytopes)]))
}
