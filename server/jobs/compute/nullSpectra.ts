import {
  buildCandidate,
  classFromHeights,
  drawCandidates,
  FormCache,
  heightsOfCode,
  InvariantError,
  polytopeSource,
  quantileOf,
  type PolytopeEntry,
} from '../../../scoring/index.ts'

export interface NullCandidatesInput {
  readonly polytope: PolytopeEntry
  readonly seed: number
  readonly count: number
}

/** The first candidates of the null sample of one polytope, as codes of their heights. */
export function nullCandidates({ polytope, seed, count }: NullCandidatesInput): {
  key: string
  heights: string
}[] {
  const { rows } = drawCandidates(polytopeSource([polytope]), seed, null, count)
  return rows.map(({ candidateKey, heights }) => ({ key: candidateKey, heights }))
}

export interface SpectraOfEachInput {
  readonly polytope: PolytopeEntry
  readonly candidates: readonly { readonly key: string; readonly heights: string }[]
  /** All eigenvalues, or the largest alone. */
  readonly whole: boolean
}

const forms = new FormCache(1_000)

/** The divisor spectrum of each, ascending; or a list of the largest eigenvalue. */
export function spectraOfEach({ polytope, candidates, whole }: SpectraOfEachInput): number[][] {
  const form = forms.form(polytope)
  return candidates.map(({ key, heights }) => {
    const given = classFromHeights(form.polytope, heightsOfCode(heights))
    if (!given.fine) throw new InvariantError(`The heights drawn for candidate ${key} are not fine.`)
    const candidate = buildCandidate(form, given.class, key)
    return whole ? [...candidate.divisorSpectrum()] : [candidate.topEigenvalue()]
  })
}

const quantiles = [0.05, 0.25, 0.5, 0.75, 0.95]

/** Quantiles of the eigenvalues of equal rank; all spectra are of one length. */
export function rankQuantiles(spectra: readonly (readonly number[])[]): number[][] {
  const [first] = spectra
  if (!first) return []
  return first.map((_, rank) => {
    const values = spectra.map((spectrum) => spectrum[rank]).sort((a, b) => a - b)
    return quantiles.map((p) => quantileOf(values, values.length, p) ?? values[0])
  })
}
