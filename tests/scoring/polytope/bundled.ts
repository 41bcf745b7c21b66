import { readFileSync } from 'node:fs'

/** A bundled polytope with all that the data file says about it. */
export interface Bundled {
  readonly id: string
  readonly vertices: number[][]
  readonly h11: number
  readonly h21: number
  readonly latticePoints: number
  readonly dualLatticePoints: number
  readonly favourable: boolean
}

export function bundled(file: 'small' | 'h11-5' | 'large'): Bundled[] {
  const path = new URL(`../../../server/library/data/polytopes-${file}.json`, import.meta.url)
  const data = JSON.parse(readFileSync(path, 'utf8')) as { polytopes: Bundled[] }
  return data.polytopes
}

/** A spread over the small and the large file: every `step`-th polytope. */
export function bundledSpread(step: number): Bundled[] {
  return [...bundled('small'), ...bundled('large')].filter((_, i) => i % step === 0)
}
