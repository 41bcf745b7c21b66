import type { CheckedRule } from '../rules/checkedRule.ts'
import {
  enrichment,
  isEasy,
  rarityOf,
  searchRate,
  type Enrichment,
  type Rarity,
  type SearchRate,
} from './islandRates.ts'
import { Histogram, type HistogramState } from './histogram.ts'
import { feasibleKind } from './merit.ts'
import { isMethodName, lawOf } from './methods.ts'
import { nullSummary } from './nullSample.ts'
import type { SearchState } from './state.ts'

/** What may be said of a search beside its null sample. */
export interface SearchStatistics {
  /** What the evaluated candidates are a sample of; null for a guided search, which draws no sample. */
  readonly law: string | null
  /** Every candidate of the scope has been scored: rates are exact and have no interval. */
  readonly exact: boolean
  /** What counts as a hit; null: nothing does, as the rule has no `hit` and there is no null sample. */
  readonly hitLine: 'rule' | 'quantile' | null
  /** Distinct hits per distinct evaluation. */
  readonly rate: SearchRate | null
  /** `rate` counts every hit, or hits to the accuracy of the histogram's bins: see `unsure`. */
  readonly rateFrom: 'all' | 'bins'
  /** Evaluations that may lie on either side of the hit line; half of them are taken for hits. */
  readonly unsure: number
  /**
   * Evaluations of candidates that the search was given to begin from. They are no fresh finds and play no part in
   * `rate`; null: the search began by itself.
   */
  readonly given: number | null
  readonly enrichment: Enrichment | null
  /** The null hits so often that most of what the search finds, chance finds as well. */
  readonly easy: boolean
  /** How rare the best score is among null candidates. */
  readonly rarity: Rarity | null
}

/**
 * @param islands states of a search, one per island
 * @param sample state of its null sample, at any time
 */
export function searchStatistics(
  islands: readonly SearchState[],
  sample: SearchState | null,
  rule: Pick<CheckedRule, 'hit'>,
): SearchStatistics {
  const summary = sample && nullSummary(sample, rule)
  const enumerated = islands.length > 0 && islands.every(isEnumerated)
  const [first] = islands
  const law = enumerated ? 'exhaustive' : first?.method
  const line = summary?.quantile99 ?? null
  const hitLine = rule.hit !== null ? 'rule' : line === null ? null : 'quantile'
  const counts = islands.map(({ evaluations, hits, histogram, given }) => {
    const own = evaluations - (given?.evaluations ?? 0)
    return hitLine === 'rule' || line === null
      ? { evaluations: own, hits, unsure: 0 }
      : { evaluations: own, ...hitsAbove(histogram, line) }
  })
  const unsure = hitLine === null ? 0 : counts.reduce((sum, count) => sum + count.unsure, 0)
  const pooled = hitLine === null ? null : searchRate(counts)
  const rate = pooled && enumerated ? { ...pooled, interval: null } : pooled
  const nullRate = summary?.hit ?? null
  const scores = (sample?.sample.rows ?? [])
    .filter(({ kind }) => kind === feasibleKind)
    .map(({ value }) => value)
  const best = Math.max(...islands.flatMap(({ curve }) => curve.slice(-1).map(([, score]) => score)))
  return {
    law: law !== undefined && isMethodName(law) ? lawOf(law, first?.chain ?? null) : null,
    exact: enumerated,
    hitLine,
    rate,
    rateFrom: unsure === 0 ? 'all' : 'bins',
    unsure,
    given:
      first?.given === undefined
        ? null
        : islands.reduce((sum, { given }) => sum + (given?.evaluations ?? 0), 0),
    enrichment: rate && nullRate && enrichment(rate, nullRate),
    easy: hitLine === 'rule' && nullRate !== null && isEasy(nullRate),
    rarity: sample && best > -Infinity ? rarityOf(best, scores, sample.evaluations) : null,
  }
}

/** Scores above a line, with how many of them may lie below it, which are counted half. */
export function hitsAbove(
  histogram: HistogramState,
  line: number,
): { readonly hits: number; readonly unsure: number } {
  const { least, most } = new Histogram(histogram).countAbove(line)
  return { hits: Math.round((least + most) / 2), unsure: most - least }
}

/** True of an island that has scored its part of a complete enumeration. */
function isEnumerated({ method, chain, ended }: SearchState): boolean {
  if (ended !== 'space-exhausted') return false
  const phase = typeof chain === 'object' && chain !== null && 'phase' in chain ? chain.phase : null
  return method === 'exhaustive' || (method === 'auto' && phase === 'enumeration')
}
