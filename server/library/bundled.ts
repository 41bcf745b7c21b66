import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { basename } from 'node:path'
import { fileURLToPath } from 'node:url'
import { z } from 'zod'

const bundledPolytopeSchema = z.object({
  id: z.string(),
  vertices: z.array(z.array(z.number().int()).length(4)),
  h11: z.number().int(),
  h21: z.number().int(),
  latticePoints: z.number().int(),
  dualLatticePoints: z.number().int(),
  favourable: z.boolean(),
  weights: z.array(z.number().int()).length(5).optional(),
  side: z.enum(['fan', 'newton']).optional(),
})
export type BundledPolytope = z.infer<typeof bundledPolytopeSchema>

const bundledFileSchema = z.object({ about: z.string(), polytopes: z.array(bundledPolytopeSchema) })

export interface BundledFile {
  readonly name: string
  readonly digest: string
  readonly polytopes: readonly BundledPolytope[]
}

/** Located relative to this module: the build copies the data beside the compiled code. */
const bundled = (name: string) => new URL(`./data/${name}`, import.meta.url)

/** Loaded before anything else at first start: everything with h11 up to 4, and the spread up to h11 = 491. */
export const firstFiles = [bundled('polytopes-small.json'), bundled('polytopes-large.json')]

/** Loaded afterwards: h11 = 5. */
export const laterFiles = [bundled('polytopes-h11-5.json')]

export function readBundledFile(file: URL): BundledFile {
  const bytes = readFileSync(file)
  const { polytopes } = bundledFileSchema.parse(JSON.parse(bytes.toString('utf8')))
  return {
    name: basename(fileURLToPath(file)),
    digest: createHash('sha256').update(bytes).digest('hex'),
    polytopes,
  }
}
