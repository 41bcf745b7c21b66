import { useState } from 'react'
import { Link } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { classCountLimit, type PolytopeClasses } from '../../../shared/polytopeStructure.ts'
import { classesQuery, useCountClasses } from '../../api/polytopes.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Facts } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Failure, QueryView } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'

/** How many classes a polytope has, as far as that is known, and the candidates that were met. */
export function Classes({ polytope, campaign }: { polytope: string; campaign?: string }) {
  const classes = useQuery(classesQuery(polytope, campaign))
  return (
    <QueryView query={classes} what="the classes">
      {(answer) => (
        <div className="flex flex-col gap-4">
          <Exact polytope={polytope} campaign={campaign} classes={answer} />
          <Known classes={answer} campaign={campaign} />
        </div>
      )}
    </QueryView>
  )
}

function Exact({
  polytope,
  campaign = '',
  classes,
}: {
  polytope: string
  campaign?: string
  classes: PolytopeClasses
}) {
  const count = useCountClasses(polytope, campaign)
  const barred = useBarred('previews.run')
  const { counting, classesSeen, classBound, classDigits } = classes
  if (classDigits !== null) {
    const orbits =
      classes.classOrbits === null ? (
        <span className="text-soft">{counting ? 'being counted…' : 'not known'}</span>
      ) : classes.classOrbits === classes.classes ? (
        <Digits value={classDigits} />
      ) : (
        <Num value={classes.classOrbits} />
      )
    return (
      <Facts
        className="max-w-[480px]"
        rows={[
          ['Exact number of classes', <Digits key="v" value={classDigits} />],
          ['Modulo the symmetry group', <span key="v">{orbits}</span>],
        ]}
      />
    )
  }
  return (
    <div>
      <p role="status" className="prose-line">
        {counting
          ? `Counting: ${counted(counting.seen, 'class', 'classes')} met so far.`
          : classesSeen !== null
            ? `At least ${formatNumber(classesSeen)} classes; the count was given up there. Too many to enumerate.`
            : 'The classes of this polytope have not been counted.'}
        {classBound !== null && (
          <>
            {' '}
            There are at most 10<sup>{classBound.toFixed(1)}</sup>, the product over the 2-faces.
          </>
        )}
      </p>
      {!counting && classesSeen === null && (
        <>
          <Button className="mt-2" busy={count.isPending} unavailable={barred} onClick={() => count.mutate()}>
            Count the classes
          </Button>
          <p className="mt-1 text-xs text-soft">
            Exact: products over independent 2-faces, else a walk through every fine regular class, given up
            after {formatNumber(classCountLimit)}.
          </p>
        </>
      )}
      {count.isError && <Failure title="The count was not begun." error={count.error} />}
    </div>
  )
}

/** An integer of any size. */
function Digits({ value }: { value: string }) {
  return (
    <span data-raw={value} className="break-all tabular-nums">
      {value.replace(/\B(?=(\d{3})+$)/g, '\u2009')}
    </span>
  )
}

const first = 10

function Known({ classes, campaign }: { classes: PolytopeClasses; campaign?: string }) {
  const [all, setAll] = useState(false)
  const { known, total } = classes
  if (total === 0) {
    return <p className="text-soft">Your campaigns have not met a candidate on this polytope yet.</p>
  }
  const shown = all ? known : known.slice(0, first)
  return (
    <div>
      <h3 className="mb-2 text-sm font-medium">{counted(total, 'candidate')} met in your campaigns</h3>
      <Table label="Candidates met in your campaigns" fit>
        <thead>
          <tr>
            <Th>Candidate</Th>
            <Th numeric>Verdicts</Th>
            <Th numeric>Shortlists</Th>
            <Th numeric>Searches</Th>
            <Th numeric>Imports</Th>
          </tr>
        </thead>
        <tbody>
          {shown.map((row) => (
            <tr key={row.key}>
              <Td className="font-mono text-xs">
                <Link
                  className="text-action hover:underline"
                  to={`/candidates/${row.key}${campaign ? `?campaign=${campaign}` : ''}`}
                >
                  {row.key.slice(0, 12)}
                </Link>
              </Td>
              <Td numeric>{row.verdicts}</Td>
              <Td numeric>{row.shortlists}</Td>
              <Td numeric>{row.searches}</Td>
              <Td numeric>{row.imports}</Td>
            </tr>
          ))}
        </tbody>
      </Table>
      {known.length > shown.length && (
        <Button className="mt-2" onClick={() => setAll(true)}>
          Show {known.length < total ? `the first ${known.length}` : `all ${known.length}`}
        </Button>
      )}
    </div>
  )
}
