import { Link } from 'react-router-dom'
import { reportColumn, scoreColumn, type AssemblySettings } from '../../../shared/assemblies.ts'
import { type ShortlistDetail, type ShortlistProvenance } from '../../../shared/shortlists.ts'
import { AssemblyCountsView } from '../../components/shortlist/AssemblyCountsView.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { Facts, Section } from '../../components/ui/Layout.tsx'
import { counted, formatNumber, formatTime } from '../../lib/numbers.ts'

/** What the list was made from, as it was then. */
export function ProvenanceSection({ campaign, shortlist }: { campaign: string; shortlist: ShortlistDetail }) {
  const { provenance, rescored } = shortlist
  return (
    <Section
      title="What it was made from"
      note={`Frozen when it was made, ${formatTime(shortlist.createdAt)}, by ${shortlist.author}. Engine ${shortlist.engineVersion}.`}
    >
      <div className="grid gap-x-10 gap-y-5 lg:grid-cols-[minmax(280px,360px)_minmax(0,1fr)]">
        <div>
          {provenance ? (
            <>
              <p className="mb-2">{orderWords(provenance.assembly)}</p>
              <AssemblyCountsView
                counts={provenance.counts}
                size={shortlist.size}
                assembly={provenance.assembly}
              />
              {provenance.takenOut !== undefined && (
                <p className="mt-2 text-soft">
                  {counted(provenance.takenOut, 'row')} of an earlier issue taken out by hand since it was
                  drawn.
                </p>
              )}
            </>
          ) : (
            <p className="text-soft">
              Made before this was recorded: only its searches and its rule are known.
            </p>
          )}
          <Relations campaign={campaign} from={provenance?.from ?? null} rescored={rescored} />
        </div>
        <div className="min-w-0">
          {provenance && provenance.searches.length > 0 && (
            <SearchesThen campaign={campaign} searches={provenance.searches} />
          )}
          <h3 className="mt-4 mb-1 text-xs font-medium text-soft">The rule it is ranked by</h3>
          <Rule text={shortlist.rule} label="The rule" />
          <p className="mt-2 font-mono text-xs break-all text-soft">{shortlist.scoringHash}</p>
          {provenance?.from && (
            <details className="mt-3">
              <summary className="cursor-pointer text-action">The rule of the list before</summary>
              <Rule text={provenance.from.rule} label="The rule of the list before" />
              <p className="mt-2 font-mono text-xs break-all text-soft">{provenance.from.scoringHash}</p>
            </details>
          )}
        </div>
      </div>
    </Section>
  )
}

function Rule({ text, label }: { text: string; label: string }) {
  return (
    <pre tabIndex={0} aria-label={label} className="max-h-64 overflow-auto font-mono text-xs leading-5">
      {text}
    </pre>
  )
}

function orderWords({ pareto }: AssemblySettings): string {
  if (pareto === null) return 'Ranked by score.'
  const words = pareto.map(
    ({ column, direction }) =>
      `${direction === 'max' ? 'large' : 'small'} ${column === scoreColumn ? 'score' : column.slice(reportColumn('').length)}`,
  )
  return `Ranked by Pareto fronts of ${words.slice(0, -1).join(', ')} and ${words.at(-1)}.`
}

function Relations({
  campaign,
  from,
  rescored,
}: {
  campaign: string
  from: ShortlistProvenance['from']
  rescored: ShortlistDetail['rescored']
}) {
  if (from === null && rescored.length === 0) return null
  const link = (id: string, name: string) => (
    <Link key={id} to={`/campaigns/${campaign}/shortlists/${id}`} className="text-action hover:underline">
      {name}
    </Link>
  )
  return (
    <Facts
      className="mt-4"
      rows={[
        ...(from
          ? [
              [
                'Scored anew from',
                <span key="from">
                  {link(from.id, from.name)}{' '}
                  <span className="text-soft">
                    {from.targetName}, version {from.targetVersion}
                  </span>
                </span>,
              ] as const,
            ]
          : []),
        ...rescored.map(
          ({ id, name, targetName, targetVersion }) =>
            [
              'Scored anew as',
              <span key={id}>
                {link(id, name)}{' '}
                <span className="text-soft">
                  {targetName}, version {targetVersion}
                </span>
              </span>,
            ] as const,
        ),
      ]}
    />
  )
}

function SearchesThen({
  campaign,
  searches,
}: {
  campaign: string
  searches: ShortlistProvenance['searches']
}) {
  return (
    <Table label="Its searches as they were" fit>
      <thead>
        <tr>
          <Th>Search</Th>
          <Th>Target</Th>
          <Th>Method</Th>
          <Th numeric>Seed</Th>
          <Th numeric>Evaluations</Th>
          <Th numeric>Polytopes</Th>
          <Th numeric>Null sample</Th>
          <Th numeric>Best of the null</Th>
        </tr>
      </thead>
      <tbody>
        {searches.map((search) => (
          <tr key={search.id}>
            <Td>
              <Link
                to={`/campaigns/${campaign}/searches/${search.id}`}
                className="text-action hover:underline"
              >
                {search.name}
              </Link>
            </Td>
            <Td>
              {search.targetName} <span className="text-soft">v{search.targetVersion}</span>
            </Td>
            <Td>{search.method}</Td>
            <Td numeric>{search.seed}</Td>
            <Td numeric>
              <span title={`of ${formatNumber(search.budget)} allowed; it was ${search.state}`}>
                <Num value={search.evaluations} />
              </span>
            </Td>
            <Td numeric>
              <Num value={search.polytopes} />
            </Td>
            <Td numeric className="text-null">
              {search.null ? (
                <span title={`${search.null.law}; seed ${search.null.seed}`}>
                  <Num value={search.null.evaluated} />
                </span>
              ) : (
                '–'
              )}
            </Td>
            <Td numeric className="text-null">
              <Num value={search.null?.best ?? null} />
            </Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
