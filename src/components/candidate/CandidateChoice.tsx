import { useState, type ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { relativesQuery } from '../../api/relatives.ts'
import { shortlistQuery, shortlistsQuery } from '../../api/shortlists.ts'
import { counted } from '../../lib/numbers.ts'
import { ClassThumb } from '../geometry/ClassThumb.tsx'
import { ButtonLink } from '../ui/Button.tsx'
import { Select, TextField } from '../ui/Field.tsx'
import { Outcome } from '../ui/Outcome.tsx'
import { Empty, QueryView } from '../ui/States.tsx'

interface ChoiceProps {
  campaign: string | null
  candidate: string
  /** List that is shown first. */
  shortlist?: string
  addressOf: (other: string) => string
}

/** Where a candidate key stands in a text, be it a whole address. */
export const keyIn = (text: string): string | null => /[0-9a-f]{32}/.exec(text.toLowerCase())?.[0] ?? null

const shownAtOnce = 40

/** Another candidate, out of those known here: a pasted key, relatives, the lists of the campaign. */
export function CandidateChoice({ campaign, candidate, shortlist, addressOf }: ChoiceProps) {
  const [text, setText] = useState('')
  const key = keyIn(text)
  const begins = text.trim().toLowerCase()
  return (
    <div className="flex flex-col gap-5">
      <div className="flex flex-wrap items-start gap-3">
        <TextField
          label="Key or address of a candidate"
          hint="The beginning of a key narrows the lists below."
          className="min-w-0 flex-1 basis-72"
          mono
          spellCheck={false}
          autoComplete="off"
          value={text}
          error={key === candidate ? 'This is the candidate itself.' : null}
          onChange={(event) => setText(event.target.value)}
        />
        {key && key !== candidate && (
          <ButtonLink kind="primary" className="mt-5" to={addressOf(key)}>
            Compare with {key.slice(0, 10)}
          </ButtonLink>
        )}
      </div>
      {!key && <Related {...{ campaign, candidate, addressOf, begins }} />}
      {!key && campaign && <Listed {...{ campaign, candidate, shortlist, addressOf, begins }} />}
    </div>
  )
}

function Related({ campaign, candidate, addressOf, begins }: ChoiceProps & { begins: string }) {
  const relatives = useQuery(relativesQuery(campaign, candidate))
  return (
    <QueryView query={relatives} what="the relatives">
      {({ nearDuplicates, equivalents }) => {
        const near = nearDuplicates.filter(({ key }) => key.startsWith(begins))
        const equal = equivalents.filter(({ key }) => key.startsWith(begins))
        return (
          <>
            {near.length > 0 && (
              <Group title="Near duplicates on this polytope">
                {near.slice(0, 8).map(({ key, triangles }) => (
                  <Choice key={key} candidate={key} to={addressOf(key)}>
                    {counted(triangles, 'other triangle')}
                  </Choice>
                ))}
              </Group>
            )}
            {equal.length > 0 && (
              <Group title="Equal invariants: may be diffeomorphic">
                {equal.slice(0, 8).map(({ key, polytopeName, samePolytope }) => (
                  <Choice key={key} candidate={key} to={addressOf(key)}>
                    {samePolytope ? 'this polytope' : polytopeName}
                  </Choice>
                ))}
              </Group>
            )}
          </>
        )
      }}
    </QueryView>
  )
}

function Listed({
  campaign,
  candidate,
  shortlist,
  addressOf,
  begins,
}: ChoiceProps & { campaign: string; begins: string }) {
  const lists = useQuery(shortlistsQuery(campaign))
  const [chosen, setChosen] = useState(shortlist)
  const id = chosen ?? lists.data?.[0]?.id
  const list = useQuery({ ...shortlistQuery(campaign, id ?? ''), enabled: id !== undefined })
  if (lists.data?.length === 0) return null
  return (
    <div>
      {lists.data && (
        <Select
          label="In the shortlist"
          className="mb-2 max-w-80"
          value={id}
          onChange={(event) => setChosen(event.target.value)}
          options={lists.data.map((one) => [one.id, `${one.name} (${one.size})`] as const)}
        />
      )}
      <QueryView query={list} what="the shortlist">
        {({ rows }) => {
          const fitting = rows.filter(
            ({ candidateKey }) => candidateKey !== candidate && candidateKey.startsWith(begins),
          )
          if (fitting.length === 0) return <Empty title="No other candidate of this list fits." />
          return (
            <>
              <ul aria-label="Candidates of the list">
                {fitting.slice(0, shownAtOnce).map((row) => (
                  <Choice
                    key={row.candidateKey}
                    candidate={row.candidateKey}
                    to={addressOf(row.candidateKey)}
                  >
                    <span className="text-soft">rank {row.rank}</span> <Outcome outcome={row.outcome} />
                  </Choice>
                ))}
              </ul>
              {fitting.length > shownAtOnce && (
                <p className="mt-1 text-xs text-soft">
                  The first {shownAtOnce} of {fitting.length}; the beginning of a key finds the others.
                </p>
              )}
            </>
          )
        }}
      </QueryView>
    </div>
  )
}

function Group({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section>
      <h3 className="mb-1 text-sm">{title}</h3>
      <ul>{children}</ul>
    </section>
  )
}

function Choice({ candidate, to, children }: { candidate: string; to: string; children: ReactNode }) {
  return (
    <li className="border-b last:border-b-0">
      <Link to={to} className="flex min-h-9 flex-wrap items-center gap-x-3 hover:bg-action-wash">
        <span className="font-mono text-xs text-action">{candidate.slice(0, 10)}</span>
        <ClassThumb candidate={candidate} />
        <span>{children}</span>
      </Link>
    </li>
  )
}
