import { useState } from 'react'
import { Link, useParams, useSearchParams } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { candidateQuery, candidateRecordQuery } from '../../api/candidates.ts'
import { HighlightContext, HighlightStore } from '../../components/geometry/highlight.ts'
import { useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { Facts, PageHead, Section } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { QueryView } from '../../components/ui/States.tsx'
import { AtlasSection } from './AtlasSection.tsx'
import { CommentSection } from './CommentSection.tsx'
import { CompareWith } from './CompareWith.tsx'
import { CertificateSection } from './CertificateSection.tsx'
import { ComponentSection } from './ComponentSection.tsx'
import { ConeSection } from './ConeSection.tsx'
import { CurveTable } from './CurveTable.tsx'
import { DivisorTable } from './DivisorTable.tsx'
import { FibrationSection } from './FibrationSection.tsx'
import { IntersectionMatrix } from './IntersectionMatrix.tsx'
import { IntersectionTable } from './IntersectionTable.tsx'
import { Provenance } from './Provenance.tsx'
import { RelativesSection } from './RelativesSection.tsx'
import { SpectrumSection } from './SpectrumSection.tsx'
import { Steps } from './Steps.tsx'
import { Verdicts } from './Verdicts.tsx'

/** The dossier: geometry for everyone who may see the polytope, and what the campaign in hand knows of it. */
export function CandidatePage() {
  const { candidateKey = '' } = useParams()
  const [search] = useSearchParams()
  const campaign = useCurrentCampaign()
  const geometry = useQuery(candidateQuery(candidateKey))
  const record = useQuery({
    ...candidateRecordQuery(campaign?.id ?? '', candidateKey),
    enabled: campaign !== null,
  })
  const appearances = record.data?.appearances ?? []
  const appearance =
    appearances.find(({ shortlistId }) => shortlistId === search.get('shortlist')) ?? appearances[0]
  return (
    <QueryView query={geometry} what="the candidate" shape="page">
      {(detail) => (
        <>
          <PageHead
            title={`Candidate ${detail.key.slice(0, 10)}`}
            above={<Trail campaign={campaign?.id} geometry={detail} shortlist={appearance} />}
            actions={
              <span className="contents print:hidden">
                {campaign && appearance && <Steps campaign={campaign.id} appearance={appearance} />}
                <CompareWith
                  key={detail.key}
                  campaign={campaign?.id ?? null}
                  candidate={detail.key}
                  shortlist={appearance?.shortlistId}
                />
              </span>
            }
          >
            A 2-face class of{' '}
            <Link
              to={`/library/${detail.polytope.key}${campaign ? `?campaign=${campaign.id}` : ''}`}
              className="text-action hover:underline"
            >
              {detail.polytope.name}
            </Link>
            , Hodge numbers ({detail.polytope.h11}, {detail.polytope.h21}).
            <span className="hidden print:block">
              Key <span className="font-mono">{detail.key}</span>
              <br />
              Permanent address{' '}
              <span className="font-mono">{`${location.origin}/candidates/${detail.key}`}</span>
            </span>
          </PageHead>
          {campaign && (
            <Verdicts
              key={detail.key}
              campaign={campaign.id}
              candidate={detail.key}
              record={record}
              appearance={appearance}
            />
          )}
          <Geometry key={`geometry-${detail.key}`} geometry={detail} />
          <CertificateSection
            key={`certificate-${detail.key}`}
            campaign={campaign?.id ?? null}
            candidate={detail.key}
            appearance={appearance}
          />
          <div className="print:hidden">
            <RelativesSection
              key={`relatives-${detail.key}`}
              campaign={campaign?.id ?? null}
              candidate={detail.key}
            />
          </div>
          {campaign && (
            <CommentSection key={`comments-${detail.key}`} campaign={campaign.id} candidate={detail.key} />
          )}
          {campaign && <Provenance campaign={campaign.id} candidate={detail.key} record={record} />}
        </>
      )}
    </QueryView>
  )
}

function Trail({
  campaign,
  geometry,
  shortlist,
}: {
  campaign?: string
  geometry: CandidateGeometry
  shortlist?: { shortlistId: string; shortlistName: string }
}) {
  if (!campaign || !shortlist) return <span className="font-mono break-all">{geometry.key}</span>
  return (
    <Link
      to={`/campaigns/${campaign}/shortlists/${shortlist.shortlistId}?row=${geometry.key}`}
      className="hover:underline"
    >
      {shortlist.shortlistName}
    </Link>
  )
}

function Geometry({ geometry }: { geometry: CandidateGeometry }) {
  const [highlights] = useState(() => new HighlightStore())
  const { polytope, reference } = geometry
  return (
    <HighlightContext value={highlights}>
      <AtlasSection geometry={geometry} />
      <Section
        title="Divisors"
        note="Prime toric divisors at the reference point, scale 1. Volumes in Einstein frame, units 2π√α′ = 1, leading order."
      >
        <DivisorTable geometry={geometry} />
      </Section>
      {geometry.components && <ComponentSection components={geometry.components} />}
      <div className="grid grid-cols-1 gap-x-8 lg:grid-cols-2 print:grid-cols-2">
        <Section
          title="Intersection numbers"
          note="Non-zero κ with i ≤ j ≤ k; below, the matrix of one divisor over j and k."
        >
          <IntersectionTable intersections={geometry.intersections} points={polytope.points} />
          <div className="mt-4 print:hidden">
            <IntersectionMatrix geometry={geometry} />
          </div>
        </Section>
        <Section
          title="Curves"
          note={
            <>
              Primitive classes of the curves D<sub>i</sub> · D<sub>j</sub>, one per edge of the
              triangulation; volume at the reference point.
            </>
          }
        >
          <CurveTable curves={geometry.curves} />
        </Section>
      </div>
      <FibrationSection fibrations={geometry.fibrations} />
      <div className="grid grid-cols-1 gap-x-8 lg:grid-cols-2 print:grid-cols-2">
        <Section
          title="Reference point"
          note="The point of the Kähler cone nearest to the origin at which every curve class counted has volume at least 1."
        >
          <Facts
            rows={[
              ['Volume of the threefold', <Num key="v" value={reference.volume} digits={6} />],
              ['Norm of w', <Num key="v" value={reference.norm} digits={6} />],
              [
                'Least divisor volume',
                <Num key="v" value={Math.min(...geometry.divisors.map(({ volume }) => volume))} digits={6} />,
              ],
              [
                'Least curve volume',
                <Num key="v" value={Math.min(...geometry.curves.map(({ volume }) => volume))} digits={6} />,
              ],
              [
                'Cone',
                reference.edgeCurvesSuffice
                  ? 'edge curves alone give the point'
                  : 'circuits were needed; the true cone may be larger',
              ],
              ['Euler number', <Num key="v" value={polytope.euler} />],
              ['Favourable', polytope.favourable ? 'yes' : 'no: toric part only'],
            ]}
          />
        </Section>
        <Section title="Field-space metric">
          <SpectrumSection geometry={geometry} />
        </Section>
      </div>
      {polytope.points > 5 && <ConeSection geometry={geometry} />}
    </HighlightContext>
  )
}
