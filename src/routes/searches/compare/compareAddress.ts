import { mostCompared, overlapSizes } from '../../../../shared/comparisons.ts'

/** All that a comparison shows is in its address. */
export interface CompareView {
  ids: string[]
  /** Settings that agree are listed, too. */
  allSettings: boolean
  /** How many of the best are looked at for what is shared. */
  best: (typeof overlapSizes)[number]
}

export function readCompareView(address: URLSearchParams): CompareView {
  const ids = [...new Set((address.get('with') ?? '').split(',').filter((id) => id !== ''))]
  const best = overlapSizes.find((size) => String(size) === address.get('best')) ?? overlapSizes[0]
  return { ids: ids.slice(0, mostCompared), allSettings: address.get('settings') === 'all', best }
}

export function compareAddress(campaign: string, { ids, allSettings, best }: Partial<CompareView>): string {
  const words = [`with=${(ids ?? []).join(',')}`]
  if (allSettings) words.push('settings=all')
  if (best !== undefined && best !== overlapSizes[0]) words.push(`best=${best}`)
  return `/campaigns/${campaign}/searches/compare?${words.join('&')}`
}
