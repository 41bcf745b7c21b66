import { Link } from 'react-router-dom'
import { searchMethods, type SearchDetail } from '../../../shared/searches.ts'
import { Facts } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { counted, formatNumber, formatTime } from '../../lib/numbers.ts'

/** All that a search's result depends on, and who had it run. */
export function RunFacts({ campaign, search }: { campaign: string; search: SearchDetail }) {
  const { settings, extensions, starts } = search
  const original = extensions.reduce((left, more) => left - more, search.budget)
  const chosen = Object.entries(settings).map(([name, value]) => `${name} ${String(value)}`)
  return (
    <Facts
      rows={[
        ['Method', methodLine(search.method)],
        ...(chosen.length > 0 ? [['Settings', chosen.join(', ')] as const] : []),
        [
          'Budget',
          extensions.length === 0
            ? formatNumber(search.budget)
            : `${formatNumber(original)}, then ${extensions.map((more) => `+ ${formatNumber(more)}`).join(', ')}`,
        ],
        [
          'Begins from',
          starts === null ? (
            'candidates of its own'
          ) : (
            <StartsLine key="v" campaign={campaign} search={search} />
          ),
        ],
        ['Seed', <Num key="v" value={search.seed} />],
        ['Polytopes in scope', <Num key="v" value={search.polytopes} />],
        [search.imported ? 'Imported' : 'Started', `${formatTime(search.createdAt)} by ${search.author}`],
        ['Ended', search.finishedAt && !search.imported ? formatTime(search.finishedAt) : '–'],
        ['Engine', search.engineVersion],
        [
          'Scoring hash',
          <code key="v" className="font-mono text-xs break-all">
            {search.scoringHash}
          </code>,
        ],
      ]}
    />
  )
}

function StartsLine({ campaign, search }: { campaign: string; search: SearchDetail }) {
  const { starts } = search
  if (starts === null) return null
  const words = starts.used
    ? counted(starts.count, 'chosen candidate')
    : `${counted(starts.count, 'candidate')}, which this method makes nothing of,`
  const place =
    starts.kind === 'shortlist' || starts.kind === 'search'
      ? `/campaigns/${campaign}/${starts.kind === 'search' ? 'searches' : 'shortlists'}/${starts.id}`
      : starts.kind === 'imported'
        ? `/campaigns/${campaign}/imported`
        : null
  return (
    <>
      {words} of{' '}
      {place === null ? (
        starts.name
      ) : (
        <Link to={place} className="text-action hover:underline">
          {starts.name}
        </Link>
      )}
    </>
  )
}

const methodLine = (method: string) =>
  method in searchMethods ? searchMethods[method as keyof typeof searchMethods] : method
