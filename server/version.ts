import { existsSync, readFileSync } from 'node:fs'
import { z } from 'zod'

const packageSchema = z.object({ name: z.string(), version: z.string() })

/** Version of the application, from the nearest package.json that names it (source and build differ in depth). */
export function readVersion(): string {
  for (let folder = new URL('.', import.meta.url); ; folder = new URL('..', folder)) {
    const file = new URL('package.json', folder)
    if (existsSync(file)) {
      const parsed = packageSchema.safeParse(JSON.parse(readFileSync(file, 'utf8')))
      if (parsed.success && parsed.data.name === 'tessellary') return parsed.data.version
    }
    if (folder.pathname === '/') return 'unknown'
  }
}
