import { useMemo } from 'react'
import { Link, useNavigate, useSearchParams } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { ArrowLeftRight } from 'lucide-react'
import { type CandidateAlignment } from '../../../../shared/candidateAlignment.ts'
import { type CandidateGeometry } from '../../../../shared/candidates.ts'
import { alignmentQuery, candidateQuery } from '../../../api/candidates.ts'
import { CandidateChoice } from '../../../components/candidate/CandidateChoice.tsx'
import { useCurrentCampaign } from '../../../components/shell/currentCampaign.tsx'
import { Button, ButtonLink } from '../../../components/ui/Button.tsx'
import { Caution } from '../../../components/ui/Caution.tsx'
import { PageHead, Section } from '../../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../../components/ui/States.tsx'
import { counted } from '../../../lib/numbers.ts'
import { relabelled } from './candidateDifferences.ts'
import { compareCandidatesAddress, readCompared } from './compareAddress.ts'
import { ComparedSpectra } from './ComparedSpectra.tsx'
import { DivisorDifferences } from './DivisorDifferences.tsx'
import { FaceDifferences } from './FaceDifferences.tsx'
import { FactTable } from './FactTable.tsx'
import { IntersectionDifferences } from './IntersectionDifferences.tsx'

/** Two candidates side by side. */
export function CompareCandidatesPage() {
  const [address] = useSearchParams()
  const campaign = useCurrentCampaign()?.id ?? null
  const [one, two] = readCompared(address)
  return (
    <>
      <PageHead
        title="Two candidates"
        above={
          one && (
            <Link to={dossierAddress(one, campaign)} className="hover:underline">
              Candidate {one.slice(0, 10)}
            </Link>
          )
        }
        actions={one && two && <Swap one={one} two={two} campaign={campaign} />}
      />
      {!one ? (
        <Empty title="Nothing to compare yet.">
          <p className="mb-3">
            Open a candidate and choose “Compare with…”, or tick two rows of a shortlist.
          </p>
          {campaign && <ButtonLink to={`/campaigns/${campaign}/shortlists`}>To the shortlists</ButtonLink>}
        </Empty>
      ) : !two ? (
        <Section title="Compare with">
          <CandidateChoice
            campaign={campaign}
            candidate={one}
            addressOf={(other) => compareCandidatesAddress([one, other], campaign)}
          />
        </Section>
      ) : (
        <Compared one={one} two={two} campaign={campaign} />
      )}
    </>
  )
}

const dossierAddress = (key: string, campaign: string | null) =>
  `/candidates/${key}${campaign ? `?campaign=${campaign}` : ''}`

function Swap({ one, two, campaign }: { one: string; two: string; campaign: string | null }) {
  const navigate = useNavigate()
  return (
    <Button onClick={() => void navigate(compareCandidatesAddress([two, one], campaign), { replace: true })}>
      <ArrowLeftRight size={14} aria-hidden /> Exchange A and B
    </Button>
  )
}

function Compared({ one, two, campaign }: { one: string; two: string; campaign: string | null }) {
  const a = useQuery(candidateQuery(one))
  const b = useQuery(candidateQuery(two))
  const alignment = useQuery(alignmentQuery(one, two))
  return (
    <QueryView query={a} what="candidate A">
      {(dataA) => (
        <QueryView query={b} what="candidate B">
          {(dataB) => (
            <QueryView query={alignment} what="what the two have in common">
              {({ points }) => <SideBySide a={dataA} b={dataB} points={points} campaign={campaign} />}
            </QueryView>
          )}
        </QueryView>
      )}
    </QueryView>
  )
}

function SideBySide({
  a,
  b,
  points,
  campaign,
}: {
  a: CandidateGeometry
  b: CandidateGeometry
  points: CandidateAlignment['points']
  campaign: string | null
}) {
  const laid = useMemo(() => points && relabelled(b, points.image), [b, points])
  const moved = points?.image.some((image, point) => image !== point) ?? false
  return (
    <>
      {points ? (
        <p role="note" className="prose-line mb-4 border-l-2 border-edge pl-3">
          Two classes of {a.polytope.name}:{' '}
          {points.triangles === 0
            ? 'all triangles are the same.'
            : `${counted(points.triangles, 'triangle')} of ${a.triangles.length} differ, at least ${counted(Math.ceil(points.triangles / 2), 'flip')} apart.`}{' '}
          {moved &&
            'B is laid on A by the symmetry of the polytope that leaves the least difference; its points carry the numbers of A’s.'}
        </p>
      ) : (
        <p role="note" className="prose-line mb-4 border-l-2 border-edge pl-3">
          These candidates are on different polytopes, so their points, triangles and intersection numbers
          have nothing to do with each other. Facts and spectra can be compared.
        </p>
      )}
      <div className="grid grid-cols-1 gap-x-8 xl:grid-cols-2">
        <Section title="Facts">
          <FactTable a={a} b={b} addressOf={(key) => dossierAddress(key, campaign)} />
          <Caution className="mt-3" />
        </Section>
        <Section title="Spectra">
          <ComparedSpectra a={a.key} b={b.key} />
        </Section>
      </div>
      {laid && (
        <>
          <FaceDifferences a={a} b={laid} keyB={b.key} />
          <IntersectionDifferences a={a} b={laid} />
          <DivisorDifferences a={a} b={laid} />
        </>
      )}
    </>
  )
}
