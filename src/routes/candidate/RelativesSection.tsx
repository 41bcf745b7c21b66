import { useState, type ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import {
  invariantWords,
  type CampaignVerdict,
  type CandidateRelatives,
  type WallInvariantsView,
} from '../../../shared/relatives.ts'
import { relativesQuery } from '../../api/relatives.ts'
import { ClassThumb } from '../../components/geometry/ClassThumb.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Facts, Section } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { QueryView } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { VerdictMark } from '../../components/ui/VerdictMark.tsx'
import { counted, formatTime } from '../../lib/numbers.ts'
import { useSeen } from '../../lib/useSeen.ts'

/** Known candidates that may be the same threefold, or nearly the same class, with the verdicts on them. */
export function RelativesSection({ campaign, candidate }: { campaign: string | null; candidate: string }) {
  const [place, seen] = useSeen()
  const query = useQuery({ ...relativesQuery(campaign, candidate), enabled: seen })
  return (
    <div ref={place}>
      <Section
        title="Relatives"
        note="Other known candidates with the same Wall-type invariants, and those on the same polytope that differ in few triangles. Verdicts are those of your own campaigns."
      >
        {seen ? (
          <QueryView query={query} what="the relatives">
            {(relatives) => <Relatives campaign={campaign} relatives={relatives} />}
          </QueryView>
        ) : (
          <p className="h-40 text-soft">Compared when this comes into view.</p>
        )}
      </Section>
    </div>
  )
}

function Relatives({ campaign, relatives }: { campaign: string | null; relatives: CandidateRelatives }) {
  const { equivalents, equivalentsTotal, compared, waiting, nearDuplicates, nearCompared, nearTotal } =
    relatives
  return (
    <div className="grid grid-cols-1 gap-x-8 gap-y-5 lg:grid-cols-[minmax(0,2fr)_minmax(0,1fr)]">
      <div className="flex min-w-0 flex-col gap-5">
        <div>
          <h3 className="text-sm">Equal invariants: may be diffeomorphic, not proven</h3>
          <p className="mb-1 text-xs text-soft">
            {counted(compared, 'known candidate')} with these Hodge numbers compared
            {waiting > 0 && `, ${counted(waiting, 'more')} still to come`}
            {equivalentsTotal > equivalents.length &&
              `; the first ${equivalents.length} of ${equivalentsTotal} are shown`}
            .
          </p>
          {equivalents.length === 0 ? (
            <p>None is known.</p>
          ) : (
            <RelativeTable
              label="Candidates with equal invariants"
              campaign={campaign}
              rows={equivalents}
              columns={[['Polytope', false]]}
              cells={({ samePolytope, polytopeKey, polytopeName }) => [
                samePolytope ? (
                  <span className="text-soft">this one</span>
                ) : (
                  <Link
                    to={`/library/${polytopeKey}${campaign ? `?campaign=${campaign}` : ''}`}
                    className="hover:underline"
                  >
                    {polytopeName}
                  </Link>
                ),
              ]}
            />
          )}
        </div>
        <div>
          <h3 className="text-sm">Near duplicates on this polytope</h3>
          <p className="mb-1 text-xs text-soft">
            {nearTotal > nearCompared
              ? `${nearCompared} of ${nearTotal} known candidates compared.`
              : `${counted(nearCompared, 'known candidate')} compared.`}
          </p>
          {nearDuplicates.length === 0 ? (
            <p>None is known.</p>
          ) : (
            <RelativeTable
              label="Near duplicates"
              campaign={campaign}
              rows={nearDuplicates}
              columns={[
                ['Other triangles', true],
                ['Flips, at least', true],
              ]}
              cells={({ triangles, flips }) => [triangles, flips]}
            />
          )}
        </div>
      </div>
      <Invariants invariants={relatives.invariants} />
    </div>
  )
}

/** Rows that are shown at once, beside those with verdicts. */
const firstRows = 8

function RelativeTable<Row extends CandidateRelatives['nearDuplicates' | 'equivalents'][number]>({
  label,
  campaign,
  rows,
  columns,
  cells,
}: {
  label: string
  campaign: string | null
  rows: readonly Row[]
  columns: readonly (readonly [name: string, numeric: boolean])[]
  cells: (row: Row) => readonly ReactNode[]
}) {
  const [all, setAll] = useState(false)
  const judged = rows.filter((row, at) => at < firstRows || row.verdicts.length > 0)
  const shown = all ? rows : judged
  return (
    <>
      <Table label={label}>
        <thead>
          <tr>
            <Th>Candidate</Th>
            {columns.map(([name, numeric]) => (
              <Th key={name} numeric={numeric}>
                {name}
              </Th>
            ))}
            <Th>Largest 2-faces</Th>
            <Th>Verdicts</Th>
          </tr>
        </thead>
        <tbody>
          {shown.map((row) => (
            <tr key={row.key}>
              <Td>
                <Link
                  to={`/candidates/${row.key}${campaign ? `?campaign=${campaign}` : ''}`}
                  className="font-mono text-xs text-action hover:underline"
                >
                  {row.key.slice(0, 10)}
                </Link>
              </Td>
              {cells(row).map((content, at) => (
                <Td key={columns[at]?.[0]} numeric={columns[at]?.[1]}>
                  {content}
                </Td>
              ))}
              <Td>
                <ClassThumb candidate={row.key} />
              </Td>
              <Td>
                <EarlierVerdicts verdicts={row.verdicts} />
              </Td>
            </tr>
          ))}
        </tbody>
      </Table>
      {rows.length > shown.length && (
        <Button kind="quiet" onClick={() => setAll(true)}>
          Show all {rows.length}
        </Button>
      )}
    </>
  )
}

function EarlierVerdicts({ verdicts }: { verdicts: readonly CampaignVerdict[] }) {
  if (verdicts.length === 0) return <span className="text-soft">–</span>
  return (
    <ul>
      {verdicts.map((verdict) => (
        <li key={verdict.id} className="flex items-center gap-x-2" title={verdict.reason || undefined}>
          <VerdictMark verdict={verdict} />
          <span className="text-soft">
            {verdict.campaignName}, {verdict.targetName} v{verdict.targetVersion}; {verdict.author},{' '}
            {formatTime(verdict.createdAt)}
          </span>
        </li>
      ))}
    </ul>
  )
}

const words = Object.entries(invariantWords) as [keyof typeof invariantWords, string][]

function Invariants({ invariants }: { invariants: WallInvariantsView }) {
  return (
    <div className="min-w-0">
      <h3 className="mb-1 text-sm">
        Invariants over H²(X, <span className="font-serif">Z</span>)
      </h3>
      <Facts
        rows={words.map(([name, word]) => {
          const value = invariants[name]
          return [
            word,
            typeof value === 'number' ? (
              <Num key="v" value={value} />
            ) : (
              <span key="v" className="font-mono text-xs break-words" data-raw={value.join(' ')}>
                {value.length === 0 ? 'none' : value.join(', ')}
              </span>
            ),
          ] as const
        })}
      />
      <p className="mt-2 font-mono text-xs break-all text-soft">
        {invariants.key} (version {invariants.version})
      </p>
    </div>
  )
}
