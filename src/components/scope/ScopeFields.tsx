import { useState } from 'react'
import { keepPreviousData, useQuery } from '@tanstack/react-query'
import { X } from 'lucide-react'
import { maximumScope, type PolytopeFilter, type Scope } from '../../../shared/polytopes.ts'
import { polytopePageQuery, polytopeQuery, scopeQuery } from '../../api/polytopes.ts'
import { explain } from '../../api/request.ts'
import { useDelayed } from '../../lib/useDelayed.ts'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { changedFilter } from '../../lib/libraryAddress.ts'
import { CollectionSelect } from '../collection/CollectionSelect.tsx'
import { FilterFields } from '../filter/FilterFields.tsx'
import { IconButton } from '../ui/Button.tsx'
import { TextField } from '../ui/Field.tsx'
import { NothingMatches } from './NothingMatches.tsx'

interface ScopeFieldsProps {
  campaign: string
  scope: Scope
  onScope: (scope: Scope) => void
}

/** What candidates are drawn from: chosen polytopes, or all that match a filter; with its size from the server. */
export function ScopeFields({ campaign, scope, onScope }: ScopeFieldsProps) {
  return (
    <div className="flex flex-col gap-3">
      <fieldset className="flex flex-wrap gap-x-4 gap-y-1">
        <legend className="sr-only">Kind of scope</legend>
        {(
          [
            ['polytopes', 'Chosen polytopes'],
            ['collection', 'A collection'],
            ['filter', 'All that match a filter'],
          ] as const
        ).map(([kind, label]) => (
          <label key={kind} className="inline-flex items-center gap-1.5">
            <input
              type="radio"
              name="scope-kind"
              checked={scope.kind === kind}
              onChange={() => onScope(emptyScope(kind))}
            />
            {label}
          </label>
        ))}
      </fieldset>
      {scope.kind === 'filter' && (
        <FilterFields
          campaign={campaign}
          filter={scope.filter}
          onChange={(changes) => onScope({ kind: 'filter', filter: changedFilter(scope.filter, changes) })}
        />
      )}
      {scope.kind === 'collection' && (
        <CollectionSelect
          className="max-w-96"
          label="Collection"
          none="choose…"
          campaign={campaign}
          value={scope.collection}
          onChange={(found) =>
            onScope({ kind: 'collection', collection: found?.id ?? '', name: found?.name })
          }
        />
      )}
      {scope.kind === 'polytopes' && (
        <PolytopeChooser
          campaign={campaign}
          keys={scope.keys}
          onKeys={(keys) => onScope({ kind: 'polytopes', keys })}
        />
      )}
      <ScopeSummary campaign={campaign} scope={scope} />
    </div>
  )
}

function emptyScope(kind: Scope['kind']): Scope {
  if (kind === 'polytopes') return { kind, keys: [] }
  return kind === 'collection' ? { kind, collection: '' } : { kind, filter: {} }
}

export const isEmptyScope = (scope: Scope) =>
  (scope.kind === 'polytopes' && scope.keys.length === 0) ||
  (scope.kind === 'collection' && scope.collection === '')

/** How many polytopes the scope holds and how large they are, as the server counts them. */
export function ScopeSummary({ campaign, scope }: { campaign: string; scope: Scope }) {
  const settled = useDelayed(scope, 250)
  const summary = useQuery({
    ...scopeQuery(campaign, settled),
    enabled: !isEmptyScope(settled),
    placeholderData: keepPreviousData,
  })
  if (isEmptyScope(scope)) {
    const what = scope.kind === 'collection' ? 'a collection' : 'at least one polytope'
    return <p className="text-soft">Choose {what}.</p>
  }
  if (summary.isError) {
    return (
      <p role="alert" className="text-rejected">
        {explain(summary.error)}
      </p>
    )
  }
  if (!summary.data) return <p className="text-soft">Counting…</p>
  const { count, h11Min, h11Max, pointsMax } = summary.data
  if (count === 0) return <NothingMatches campaign={campaign} again={summary.refetch} />
  return (
    <p role="status" className={count > maximumScope ? 'text-rejected' : ''}>
      <strong className="font-medium">{counted(count, 'polytope')}</strong>
      {h11Min !== null && h11Max !== null && (
        <>, h11 {h11Min === h11Max ? h11Min : `from ${h11Min} to ${h11Max}`}</>
      )}
      {pointsMax !== null && <>, up to {counted(pointsMax, 'point')}</>}
      {count > maximumScope && `; a scope holds at most ${formatNumber(maximumScope)}`}
    </p>
  )
}

/** Chosen polytopes that are listed by name; of a long list the rest is only counted. */
const namedKeys = 12

function PolytopeChooser({
  campaign,
  keys,
  onKeys,
}: {
  campaign: string
  keys: readonly string[]
  onKeys: (keys: string[]) => void
}) {
  const [text, setText] = useState('')
  const wanted = useDelayed(text.trim(), 200)
  const found = useQuery({
    ...polytopePageQuery(filterFrom(wanted, campaign), { sort: 'h11', order: 'asc' }, 0),
    enabled: wanted !== '',
    placeholderData: keepPreviousData,
  })
  const offered =
    wanted === '' ? [] : (found.data?.rows ?? []).filter((row) => !keys.includes(row.key)).slice(0, 8)
  return (
    <div>
      {keys.length > 0 && (
        <ul className="mb-2 flex max-h-32 flex-wrap gap-x-3 gap-y-1 overflow-y-auto">
          {keys.slice(0, namedKeys).map((key) => (
            <li key={key} className="inline-flex items-center border-b">
              <PolytopeName campaign={campaign} polytope={key} />
              <IconButton
                label="Take it out of the scope"
                onClick={() => onKeys(keys.filter((other) => other !== key))}
              >
                <X size={13} aria-hidden />
              </IconButton>
            </li>
          ))}
          {keys.length > namedKeys && (
            <li className="text-soft">
              and {keys.length - namedKeys} more{' '}
              <button type="button" className="text-action underline" onClick={() => onKeys([])}>
                Take all out
              </button>
            </li>
          )}
        </ul>
      )}
      <TextField
        label="Add a polytope"
        value={text}
        hint="By part of its name, or by Hodge numbers as in “50, 7”."
        onChange={(event) => setText(event.target.value)}
      />
      {found.isError && wanted !== '' && <p className="text-xs text-rejected">{explain(found.error)}</p>}
      {offered.length > 0 && (
        <ul aria-label="Polytopes that match" className="mt-1 border-t">
          {offered.map((row) => (
            <li key={row.key} className="border-b">
              <button
                type="button"
                className="flex min-h-8 w-full items-center gap-3 px-1 text-left hover:bg-action-wash"
                onClick={() => {
                  onKeys([...keys, row.key])
                  setText('')
                }}
              >
                <span className="flex-1 text-action">{row.name}</span>
                <span>
                  ({row.h11}, {row.h21})
                </span>
                <span className="text-soft">{counted(row.points, 'point')}</span>
              </button>
            </li>
          ))}
        </ul>
      )}
      {wanted !== '' && found.data && offered.length === 0 && !found.isPlaceholderData && (
        <p className="mt-1 text-xs text-soft">No further polytope matches “{wanted}”.</p>
      )}
    </div>
  )
}

/** "50, 7" and "(50,7)" mean Hodge numbers; anything else is part of a name. */
export function filterFrom(text: string, campaign: string): PolytopeFilter & { campaign: string } {
  const pair = /^\(?\s*(\d+)\s*,\s*(\d+)\s*\)?$/.exec(text)
  if (!pair) return { text, campaign }
  const [h11, h21] = [Number(pair[1]), Number(pair[2])]
  return { h11Min: h11, h11Max: h11, h21Min: h21, h21Max: h21, campaign }
}

function PolytopeName({ campaign, polytope }: { campaign: string; polytope: string }) {
  const { data } = useQuery(polytopeQuery(polytope, campaign))
  return data ? (
    <span>
      {data.name}{' '}
      <span className="text-soft">
        ({data.h11}, {data.h21})
      </span>
    </span>
  ) : (
    <span className="font-mono text-xs">{polytope.slice(0, 8)}…</span>
  )
}
