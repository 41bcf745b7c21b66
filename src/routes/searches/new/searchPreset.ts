import { type Scope } from '../../../../shared/polytopes.ts'
import { type StartsSource } from '../../../../shared/searchRunning.ts'
import { searchMethods, type SearchDetail } from '../../../../shared/searches.ts'
import { filterNames } from '../../../../shared/polytopes.ts'
import { scopeFromAddress } from '../../../components/scope/scopeAddress.ts'

/** What a composer holds, as typed: numbers are texts until the search is started. */
export interface Draft {
  readonly target: string
  /** Empty: the latest. */
  readonly version: string
  readonly scope: Scope
  readonly method: keyof typeof searchMethods
  readonly budget: string
  readonly seed: string
  readonly islands: string
  readonly keep: string
  /** Empty: as many as the engine thinks fit. */
  readonly descents: string
  readonly patience: string
  readonly surrogate: boolean
  readonly starts: StartsSource | null
}

const texts = ['budget', 'seed', 'islands', 'keep', 'descents', 'patience'] as const

/** Whether a method has a surrogate unless somebody decides otherwise: it pays for all guided ones but tempering. */
export const surrogateByDefault = (method: Draft['method']): boolean => method !== 'tempering'

/** Polytopes and candidates that an address names one by one; of more it would grow too long to be passed on. */
export const namedInAddress = 60
export const candidatesInAddress = 200

const keysOf = (text: string | null): string[] =>
  (text ?? '').split(',').filter((key) => /^[0-9a-f]{32}$/.test(key))

/** The parts of a composer that an address names; what does not fit its form is left out. */
export function draftFromAddress(search: URLSearchParams): Partial<Draft> {
  const draft: { -readonly [Name in keyof Draft]?: Draft[Name] } = {}
  const target = search.get('target')
  if (target) draft.target = target
  const version = search.get('version')
  if (version) draft.version = version
  const collection = search.get('scope') === 'collection' ? search.get('collection') : null
  const scope =
    collection !== null
      ? ({ kind: 'collection', collection } as const)
      : search.get('scope') === 'library'
        ? ({ kind: 'filter', filter: {} } as const)
        : scopeFromAddress(search)
  if (scope !== null) draft.scope = scope
  const method = search.get('method')
  if (method !== null && method in searchMethods) draft.method = method as Draft['method']
  for (const name of texts) {
    const text = search.get(name)
    if (text !== null && /^\d{1,10}$/.test(text)) draft[name] = text
  }
  const surrogate = search.get('surrogate')
  if (surrogate === 'yes' || surrogate === 'no') draft.surrogate = surrogate === 'yes'
  const starts = startsFromAddress(search)
  if (starts !== null) draft.starts = starts
  return draft
}

function startsFromAddress(search: URLSearchParams): StartsSource | null {
  const [kind, id = ''] = (search.get('start') ?? '').split(':')
  const keys = keysOf(search.get('candidates'))
  const chosen = keys.length > 0 && keys.length <= 500 ? { candidateKeys: keys } : {}
  if (kind === 'imported') return { kind, ...chosen }
  if (id === '') return null
  if (kind === 'shortlist') return { kind, id, ...chosen }
  if (kind === 'same') return { kind, id }
  if (kind !== 'search') return null
  const size = Number(search.get('best') ?? '50')
  return { kind, id, size: Number.isInteger(size) && size >= 1 && size <= 500 ? size : 50 }
}

/** An address that fills the composer in the same way. A long list of chosen polytopes is not in it. */
export function addressOfDraft(draft: Partial<Draft>): URLSearchParams {
  const search = new URLSearchParams()
  const put = (name: string, text: string | undefined) =>
    text !== undefined && text !== '' && search.set(name, text)
  put('target', draft.target)
  put('version', draft.version)
  const { scope, starts } = draft
  if (scope?.kind === 'polytopes' && scope.keys.length <= namedInAddress)
    put('polytopes', scope.keys.join(','))
  if (scope?.kind === 'collection' && scope.collection !== '') {
    put('scope', 'collection')
    put('collection', scope.collection)
  }
  if (scope?.kind === 'filter') {
    for (const name of filterNames)
      put(name, scope.filter[name] === undefined ? undefined : String(scope.filter[name]))
    if (Object.keys(scope.filter).length === 0) put('scope', 'library')
  }
  put('method', draft.method)
  for (const name of texts) put(name, draft[name])
  put('surrogate', draft.surrogate === undefined ? undefined : draft.surrogate ? 'yes' : 'no')
  if (starts) {
    put('start', starts.kind === 'imported' ? 'imported' : `${starts.kind}:${starts.id}`)
    if (starts.kind === 'search') put('best', String(starts.size))
    else if (starts.kind !== 'same' && (starts.candidateKeys?.length ?? 0) <= candidatesInAddress)
      put('candidates', starts.candidateKeys?.join(','))
  }
  return search
}

/** The composer as it was filled in for a search. */
export function draftOfSearch(search: SearchDetail): Partial<Draft> {
  const { starts, settings } = search
  const method = search.method in searchMethods ? (search.method as Draft['method']) : undefined
  return {
    target: search.targetId,
    version: search.targetVersionId,
    scope: search.scope,
    ...(method && { method }),
    budget: String(search.budget),
    seed: String(search.seed),
    islands: String(search.islands),
    keep: String(search.keep),
    descents: settings.descents === undefined ? '' : String(settings.descents),
    patience: settings.patience === undefined ? '' : String(settings.patience),
    surrogate: search.surrogate,
    starts: starts === null ? null : { kind: 'same', id: search.id },
  }
}

/** Address of a composer that is filled in as a search was, but for what is given; its seed is drawn anew. */
export function cloneAddress(campaign: string, search: SearchDetail, changes: Partial<Draft> = {}): string {
  const address = addressOfDraft({ ...draftOfSearch(search), seed: '', ...changes })
  // A long list of polytopes is read off the search itself.
  if (search.scope.kind === 'polytopes' && search.scope.keys.length > namedInAddress)
    address.set('clone', search.id)
  return `/campaigns/${campaign}/searches/new?${address.toString()}`
}

/** Address of a composer that begins from chosen candidates. */
export function startAddress(campaign: string, starts: StartsSource, changes: Partial<Draft> = {}): string {
  return `/campaigns/${campaign}/searches/new?${addressOfDraft({ ...changes, starts }).toString()}`
}
