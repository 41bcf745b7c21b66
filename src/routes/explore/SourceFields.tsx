import { Link } from 'react-router-dom'
import { explorationSizeLimit, type Place } from '../../../shared/explorations.ts'
import { describeScope } from '../../components/scope/scopeAddress.ts'
import { ScopeFold } from '../../components/scope/ScopeFold.tsx'
import { ScopeFields } from '../../components/scope/ScopeFields.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'
import { formatNumber } from '../../lib/numbers.ts'
import { type ExploreView } from './exploreAddress.ts'

const sizes = [100, 300, 500, 1_000, explorationSizeLimit]

interface SourceFieldsProps {
  campaign: string
  view: ExploreView
  onChange: (change: Partial<ExploreView>) => void
}

/** What candidates are drawn from, and how many. */
export function NullSourceFields({ campaign, view, onChange }: SourceFieldsProps) {
  const { scope, size, seed } = view
  return (
    <ScopeFold
      scope={scope}
      summary={
        <>
          Null sample of {formatNumber(size)} from <span className="text-ink">{describeScope(scope)}</span>
        </>
      }
    >
      <div className="mt-3 flex flex-col gap-3 pb-1">
        <ScopeFields campaign={campaign} scope={scope} onScope={(next) => onChange({ scope: next })} />
        <div className="flex flex-wrap gap-3">
          <Select
            label="Candidates in the sample"
            className="w-44"
            value={size}
            onChange={(event) => onChange({ size: Number(event.target.value) })}
            options={[...new Set([...sizes, size])]
              .sort((a, b) => a - b)
              .map((one) => [String(one), formatNumber(one)])}
          />
          <TextField
            label="Seed"
            className="w-28"
            inputMode="numeric"
            value={seed}
            onChange={(event) => {
              if (/^\d{1,9}$/.test(event.target.value)) onChange({ seed: Number(event.target.value) })
            }}
          />
        </div>
      </div>
    </ScopeFold>
  )
}

/** For the sample of a search's evaluations. */
export function SearchSource({
  campaign,
  search,
  name,
}: {
  campaign: string
  search: string
  name: string | null
}) {
  return (
    <p className="prose-line">
      The sample of all evaluations of{' '}
      <Link to={`/campaigns/${campaign}/searches/${search}`} className="text-action">
        {name ?? 'a search'}
      </Link>
      , as it stands now.{' '}
      <Link to={`/campaigns/${campaign}/explore`} className="text-action">
        Explore a null sample
      </Link>
    </p>
  )
}

const places: readonly (readonly [Place['kind'], string, number])[] = [
  ['scale', 'scale (1: the reference point)', 1],
  ['volume', 'volume', 1_000],
  ['smallest divisor', 'smallest divisor', 1],
]

/** Where on the ray through the reference point the columns are taken. */
export function PlaceFields({ at, onChange }: { at: Place; onChange: (at: Place) => void }) {
  return (
    <div className="flex flex-wrap gap-3">
      <Select
        label="Taken at"
        className="min-w-52 flex-1"
        value={at.kind}
        onChange={(event) => {
          const [kind, , value] = places.find(([one]) => one === event.target.value) ?? places[0]!
          onChange({ kind, value })
        }}
        options={places.map(([kind, label]) => [kind, label])}
      />
      <TextField
        key={at.kind}
        label="Value"
        className="w-24"
        inputMode="decimal"
        defaultValue={at.value}
        onChange={(event) => {
          const value = Number(event.target.value)
          if (value >= 1e-6 && value <= 1e12) onChange({ kind: at.kind, value })
        }}
      />
    </div>
  )
}
