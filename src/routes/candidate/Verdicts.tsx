import { useState } from 'react'
import { type UseQueryResult } from '@tanstack/react-query'
import { Check, Circle, X } from 'lucide-react'
import { toast } from 'sonner'
import { type CandidateRecord, type CandidateScore } from '../../../shared/candidates.ts'
import { verdictValues, type Verdict, type VerdictValue } from '../../../shared/verdicts.ts'
import { useActions } from '../../actions/useActions.ts'
import { useRequestCertification } from '../../api/certificates.ts'
import { explain } from '../../api/request.ts'
import { useGiveVerdict } from '../../api/verdicts.ts'
import { useBarred, useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { CertificateMark } from '../../components/ui/CertificateMark.tsx'
import { Section } from '../../components/ui/Layout.tsx'
import { HitMark, Outcome, ReportCell } from '../../components/ui/Outcome.tsx'
import { QueryView } from '../../components/ui/States.tsx'
import { VerdictMark } from '../../components/ui/VerdictMark.tsx'
import { VerdictDialog } from '../../components/verdict/VerdictDialog.tsx'
import { ScoreUnderTarget } from './ScoreUnderTarget.tsx'
import { formatTime } from '../../lib/numbers.ts'

type Appearance = CandidateRecord['appearances'][number]
/** A scoring to decide on: a place in a shortlist, or the score under a target. */
type Scoring = CandidateScore | Appearance
const shapes = { verified: Check, rejected: X, undecided: Circle }
const actions: Record<VerdictValue, [word: string, key: string]> = {
  verified: ['Verify…', 'v'],
  rejected: ['Reject…', 'r'],
  undecided: ['Undecided', 'u'],
}

/** Score and verdict for the target in hand, and every verdict this campaign has given. */
export function Verdicts({
  campaign,
  candidate,
  record,
  appearance,
}: {
  campaign: string
  candidate: string
  record: UseQueryResult<CandidateRecord>
  appearance?: Appearance
}) {
  return (
    <Section
      title="Score and verdict"
      note={appearance && `For ${appearance.targetName}, version ${appearance.targetVersion}.`}
    >
      <QueryView query={record} what="what this campaign knows of the candidate">
        {({ verdicts }) => (
          <div className="grid grid-cols-1 gap-x-8 gap-y-4 lg:grid-cols-2 print:grid-cols-2">
            <div>
              {appearance ? (
                <>
                  <Score appearance={appearance} />
                  <Decide
                    campaign={campaign}
                    candidate={candidate}
                    appearance={appearance}
                    current={verdicts.find(({ targetId }) => targetId === appearance.targetId)}
                  />
                </>
              ) : (
                <ScoreUnderTarget campaign={campaign} candidate={candidate}>
                  {(scoring) => (
                    <>
                      <Score appearance={scoring} />
                      <Decide
                        campaign={campaign}
                        candidate={candidate}
                        appearance={scoring}
                        current={verdicts.find(({ targetId }) => targetId === scoring.targetId)}
                      />
                    </>
                  )}
                </ScoreUnderTarget>
              )}
              <Caution className="mt-4" />
            </div>
            <History verdicts={verdicts} />
          </div>
        )}
      </QueryView>
    </Section>
  )
}

function Score({ appearance }: { appearance: Scoring }) {
  const { outcome } = appearance
  const report = outcome.kind === 'feasible' ? Object.entries(outcome.report) : []
  return (
    <dl className="mb-3 flex flex-wrap gap-x-6 gap-y-2">
      <div>
        <dt className="text-xs text-soft">score</dt>
        <dd className="text-lg text-found">
          <Outcome outcome={outcome} />
        </dd>
      </div>
      <div>
        <dt className="text-xs text-soft">hit</dt>
        <dd className="leading-7">
          <HitMark outcome={outcome} />
        </dd>
      </div>
      {report.map(([name, cell]) => (
        <div key={name}>
          <dt className="text-xs text-soft">{name}</dt>
          <dd className="leading-7">
            <ReportCell cell={cell} />
          </dd>
        </div>
      ))}
    </dl>
  )
}

function Decide({
  campaign,
  candidate,
  appearance,
  current,
}: {
  campaign: string
  candidate: string
  appearance: Scoring
  current?: CandidateRecord['verdicts'][number]
}) {
  const barred = useBarred('verdicts.give')
  const twoReaders = useCurrentCampaign()?.secondReader ?? false
  const give = useGiveVerdict(campaign)
  const [asked, setAsked] = useState<VerdictValue | null>(null)
  const [fault, setFault] = useState<string | null>(null)
  const certify = useRequestCertification(campaign)
  const send = (value: VerdictValue, reason: string) =>
    give.mutate(
      { key: candidate, targetVersionId: appearance.targetVersionId, value, reason },
      {
        onSuccess: () => {
          setAsked(null)
          toast(`Verdict: ${value}`)
        },
        onError: (error) => setFault(explain(error)),
      },
    )
  const ask = (value: VerdictValue) => {
    setFault(null)
    if (value === 'undecided') send(value, '')
    else setAsked(value)
  }
  const decide = (value: VerdictValue, shortcut: string, label: string) => ({
    ...{ id: `dossier.${value}`, section: 'Dossier', shortcut, label },
    ...{ unavailable: barred, run: () => ask(value) },
  })
  useActions([
    decide('verified', 'v', 'Verify'),
    decide('rejected', 'r', 'Reject'),
    decide('undecided', 'u', 'Put back to undecided'),
  ])
  return (
    <div>
      <p className="mb-2 flex flex-wrap items-center gap-x-2">
        Verdict: <VerdictMark verdict={current ?? null} twoReaders={twoReaders} />
        <span aria-hidden className="text-soft">
          ·
        </span>
        <a href="#certificate" className="inline-flex items-center gap-2 hover:underline">
          Certificate: <CertificateMark state={appearance.certificate.state} />
        </a>
      </p>
      <div className="flex flex-wrap gap-2">
        {verdictValues.map((value) => {
          const Shape = shapes[value]
          const [word, key] = actions[value]
          return (
            <Button key={value} unavailable={barred} busy={give.isPending} onClick={() => ask(value)}>
              <Shape size={14} aria-hidden />
              {word}
              <kbd aria-hidden className="hidden rounded border px-1 font-mono text-xs text-soft md:inline">
                {key}
              </kbd>
            </Button>
          )
        })}
      </div>
      <VerdictDialog
        asked={
          asked && {
            value: asked,
            what: `Candidate ${candidate.slice(0, 10)}`,
            certificate: appearance.certificate,
          }
        }
        busy={give.isPending}
        fault={fault}
        onGive={(reason) => asked && send(asked, reason)}
        certifying={certify.isPending}
        onCertify={() =>
          certify.mutate(
            {
              targetVersionId: appearance.targetVersionId,
              candidateKeys: [candidate],
              again: appearance.certificate.id !== null,
            },
            { onError: (error) => setFault(explain(error)) },
          )
        }
        onClose={() => setAsked(null)}
      />
    </div>
  )
}

function History({ verdicts }: { verdicts: CandidateRecord['verdicts'] }) {
  if (verdicts.length === 0) return <p className="text-soft">No verdict has been given in this campaign.</p>
  return (
    <ol aria-label="Verdicts, newest first">
      {verdicts.map((verdict) => (
        <li key={verdict.id} className="border-b py-2 first:pt-0 last:border-b-0">
          <p className="flex flex-wrap items-center gap-x-3">
            <VerdictMark verdict={verdict} />
            <span>{verdict.author}</span>
            <span className="text-soft">{formatTime(verdict.createdAt)}</span>
            <span className="text-soft">
              {verdict.targetName} v{verdict.targetVersion}
            </span>
          </p>
          <HistoryNote verdict={verdict} />
          {verdict.reason && (
            <p className="prose-line mt-1 break-words whitespace-pre-wrap">{verdict.reason}</p>
          )}
        </li>
      ))}
    </ol>
  )
}

/** Whose "verified" an entry rests on, and whether it stands again because a later one was taken back. */
function HistoryNote({ verdict: { readers, undoneBy, value } }: { verdict: Verdict }) {
  const names = readers?.map(({ name }) => name).join(' and ')
  const notes = [
    ...(readers?.length === 1 ? ['the first of two readers; a second person has to verify as well'] : []),
    ...(readers && readers.length > 1 ? [`read by ${names}`] : []),
    ...(undoneBy === null
      ? []
      : [
          value === 'undecided'
            ? `${undoneBy} took the verdict before back`
            : `stands again: ${undoneBy} took the verdict after it back`,
        ]),
  ]
  return notes.length > 0 ? <p className="text-xs text-soft">{notes.join('; ')}</p> : null
}
