import { useQuery } from '@tanstack/react-query'
import { type Scope } from '../../../../shared/polytopes.ts'
import { type StartsSource } from '../../../../shared/searchRunning.ts'
import { startsSummaryQuery, useSearches } from '../../../api/searches.ts'
import { useShortlists } from '../../../api/shortlists.ts'
import { explain } from '../../../api/request.ts'
import { Button } from '../../../components/ui/Button.tsx'
import { Select, TextField } from '../../../components/ui/Field.tsx'
import { counted } from '../../../lib/numbers.ts'

interface StartFieldsProps {
  campaign: string
  starts: StartsSource | null
  onStarts: (starts: StartsSource | null) => void
  scope: Scope
  onScope: (scope: Scope) => void
  /** The method makes nothing of them. */
  ignored: boolean
}

/** What a search begins from: by itself, or chosen candidates. */
export function StartFields({ campaign, starts, onStarts, scope, onScope, ignored }: StartFieldsProps) {
  const shortlists = useShortlists(campaign)
  const searches = useSearches(campaign)
  const lists = shortlists.data ?? []
  const runs = (searches.data ?? []).filter(({ evaluations }) => evaluations > 0)
  const choose = (kind: string) => {
    if (kind === 'shortlist') onStarts({ kind, id: lists[0]?.id ?? '' })
    else if (kind === 'search') onStarts({ kind, id: runs[0]?.id ?? '', size: 50 })
    else if (kind === 'imported') onStarts({ kind })
    else onStarts(null)
  }
  return (
    <div className="flex flex-col gap-3">
      <div className="grid max-w-[760px] grid-cols-1 gap-3 sm:grid-cols-4">
        <Select
          label="Begin from"
          className="sm:col-span-2"
          value={starts?.kind ?? 'none'}
          onChange={(event) => choose(event.target.value)}
          options={[
            ['none', 'nothing: the method draws its own'],
            ...(lists.length > 0 || starts?.kind === 'shortlist'
              ? [['shortlist', 'a shortlist'] as const]
              : []),
            ...(runs.length > 0 || starts?.kind === 'search'
              ? [['search', 'the best of a search'] as const]
              : []),
            ['imported', 'imported candidates'],
            ...(starts?.kind === 'same' ? [['same', 'what that search began from'] as const] : []),
          ]}
        />
        {starts?.kind === 'shortlist' && (
          <Select
            label="Shortlist"
            className="sm:col-span-2"
            value={starts.id}
            onChange={(event) => onStarts({ kind: 'shortlist', id: event.target.value })}
            options={lists.map(({ id, name, size }) => [id, `${name} (${size})`])}
          />
        )}
        {starts?.kind === 'search' && (
          <>
            <Select
              label="Search"
              value={starts.id}
              onChange={(event) => onStarts({ ...starts, id: event.target.value })}
              options={runs.map(({ id, name }) => [id, name])}
            />
            <TextField
              label="Best, at most"
              inputMode="numeric"
              value={String(starts.size || '')}
              onChange={(event) => {
                const size = Number(event.target.value.replace(/\D/g, ''))
                onStarts({ ...starts, size: Math.min(500, size) })
              }}
            />
          </>
        )}
      </div>
      {starts !== null && (
        <StartsSummary campaign={campaign} starts={starts} scope={scope} onScope={onScope} />
      )}
      {starts !== null && ignored && (
        <p className="text-found">
          This method makes nothing of them: its law allows no choice of where to begin.
        </p>
      )}
      {starts !== null && !ignored && (
        <p className="prose-line text-xs text-soft">
          They are scored first, as evaluations of this search. They may be listed among its best, but are not
          counted as its hits.
        </p>
      )}
    </div>
  )
}

function StartsSummary({
  campaign,
  starts,
  scope,
  onScope,
}: {
  campaign: string
  starts: StartsSource
  scope: Scope
  onScope: (scope: Scope) => void
}) {
  const isNamed = (!('id' in starts) || starts.id !== '') && (starts.kind !== 'search' || starts.size > 0)
  const summary = useQuery({ ...startsSummaryQuery(campaign, starts), enabled: isNamed })
  if (!isNamed) return <p className="text-soft">Choose what to begin from.</p>
  if (summary.isError) {
    return (
      <p role="alert" className="text-rejected">
        {explain(summary.error)}
      </p>
    )
  }
  if (!summary.data) return <p className="text-soft">Counting…</p>
  const { count, polytopeKeys, name } = summary.data
  const within = scope.kind === 'polytopes' && polytopeKeys.every((key) => scope.keys.includes(key))
  return (
    <div className="flex flex-wrap items-center gap-x-4 gap-y-2">
      <p role="status">
        <strong className="font-medium">{counted(count, 'candidate')}</strong> of {name}, on{' '}
        {counted(polytopeKeys.length, 'polytope')}
        {!within && scope.kind !== 'polytopes' && '; the scope must hold them'}
      </p>
      {!within && (
        <Button kind="quiet" onClick={() => onScope({ kind: 'polytopes', keys: polytopeKeys.slice(0, 500) })}>
          {polytopeKeys.length === 1 ? 'Search its polytope' : 'Search their polytopes'}
        </Button>
      )}
    </div>
  )
}
