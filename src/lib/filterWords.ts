import { polytopeNumberNames, polytopeNumbers } from '../../shared/polytopeNumbers.ts'
import { type PolytopeFilter } from '../../shared/polytopes.ts'
import { formatNumber } from './numbers.ts'

/** One condition of a filter in words, and the parts of the filter it is made of. */
export interface FilterWords {
  readonly words: string
  readonly parts: readonly (keyof PolytopeFilter)[]
}

/** A filter as its conditions, in the order of the library's columns. */
export function filterWords(filter: PolytopeFilter, collection?: string): FilterWords[] {
  const found: FilterWords[] = []
  if (filter.text) found.push({ words: `“${filter.text}”`, parts: ['text'] })
  if (filter.collection)
    found.push({ words: collection ? `in “${collection}”` : 'in a collection', parts: ['collection'] })
  for (const name of polytopeNumberNames) {
    const [low, high] = [filter[`${name}Min`], filter[`${name}Max`]]
    const words = rangeWords(polytopeNumbers[name].label, low, high)
    if (words) found.push({ words, parts: [`${name}Min`, `${name}Max`] })
  }
  if (filter.favourable)
    found.push({
      words: filter.favourable === 'yes' ? 'favourable' : 'not favourable',
      parts: ['favourable'],
    })
  if (filter.rigidBasis)
    found.push({
      words: filter.rigidBasis === 'yes' ? 'rigid divisors span H11' : 'rigid divisors do not span H11',
      parts: ['rigidBasis'],
    })
  if (filter.fibre !== undefined)
    found.push({ words: `a section of type F${filter.fibre}`, parts: ['fibre'] })
  if (filter.weighted)
    found.push({
      words: filter.weighted === 'yes' ? 'made from weights' : 'not from weights',
      parts: ['weighted'],
    })
  if (filter.origin) found.push({ words: filter.origin, parts: ['origin'] })
  return found
}

function rangeWords(label: string, low?: number, high?: number): string | null {
  if (low !== undefined && low === high) return `${label} = ${formatNumber(low)}`
  if (low !== undefined && high !== undefined)
    return `${label} from ${formatNumber(low)} to ${formatNumber(high)}`
  if (low !== undefined) return `${label} ≥ ${formatNumber(low)}`
  if (high !== undefined) return `${label} ≤ ${formatNumber(high)}`
  return null
}
