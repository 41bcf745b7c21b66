import { readFileSync } from 'node:fs'

export interface BundledPolytope {
  readonly id: string
  readonly vertices: number[][]
  readonly h11: number
  readonly h21: number
  readonly favourable: boolean
}

type BundledFile = 'small' | 'h11-5' | 'large'

/** The bundled polytopes of one file: 'small' has all with h11 <= 4. */
export function bundledPolytopes(file: BundledFile): BundledPolytope[] {
  const path = new URL(`../../server/library/data/polytopes-${file}.json`, import.meta.url)
  const data = JSON.parse(readFileSync(path, 'utf8')) as { polytopes: BundledPolytope[] }
  return data.polytopes
}

/** The bundled polytope whose id starts so, out of the larger set. */
export function largePolytope(start: string): BundledPolytope {
  const found = bundledPolytopes('large').find(({ id }) => id.startsWith(start))
  if (found === undefined) throw new Error(`no bundled polytope ${start}`)
  return found
}
