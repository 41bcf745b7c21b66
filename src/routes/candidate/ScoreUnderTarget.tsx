import { useState, type ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { type CandidateScore } from '../../../shared/candidates.ts'
import { type TargetSummary } from '../../../shared/targets.ts'
import { candidateScoreQuery } from '../../api/candidates.ts'
import { useTargets } from '../../api/targets.ts'
import { Select } from '../../components/ui/Field.tsx'
import { QueryView } from '../../components/ui/States.tsx'

interface ScoreUnderTargetProps {
  campaign: string
  candidate: string
  children: (scoring: CandidateScore) => ReactNode
}

/** For a candidate in no shortlist: choose the target whose latest version scores it. */
export function ScoreUnderTarget(props: ScoreUnderTargetProps) {
  const targets = useTargets(props.campaign)
  return (
    <QueryView query={targets} what="the targets">
      {(list) =>
        list.length === 0 ? (
          <p className="prose-line text-soft">
            The candidate is in no shortlist of this campaign, and the campaign has no target to score it by.{' '}
            <Link to={`/campaigns/${props.campaign}/targets/new`} className="text-action underline">
              Write one
            </Link>
            .
          </p>
        ) : (
          <Chosen {...props} targets={list} />
        )
      }
    </QueryView>
  )
}

function Chosen({
  campaign,
  candidate,
  targets,
  children,
}: ScoreUnderTargetProps & { targets: readonly TargetSummary[] }) {
  const [chosen, setChosen] = useState(targets[0].id)
  const target = targets.find(({ id }) => id === chosen) ?? targets[0]
  const scoring = useQuery(candidateScoreQuery(campaign, candidate, target.latest.id))
  return (
    <>
      <Select
        label="Score by the target"
        className="mb-3 max-w-80"
        hint="The candidate is in no shortlist of this campaign."
        value={target.id}
        onChange={(event) => setChosen(event.target.value)}
        options={targets.map(({ id, name, latest }) => [id, `${name}, version ${latest.number}`] as const)}
      />
      <QueryView query={scoring} what="the score">
        {children}
      </QueryView>
    </>
  )
}
