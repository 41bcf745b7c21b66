import { useMemo } from 'react'
import { Link, useParams } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { type PolytopeDetail } from '../../../shared/polytopes.ts'
import { polytopeQuery, structureQuery } from '../../api/polytopes.ts'
import { FaceAtlas } from '../../components/geometry/FaceAtlas.tsx'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { drawingsOf } from '../../components/geometry/faceDrawing.ts'
import { useBarred, useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { PageHead, Section } from '../../components/ui/Layout.tsx'
import { QueryView } from '../../components/ui/States.tsx'
import { Classes } from './Classes.tsx'
import { FaceTable } from './FaceTable.tsx'
import { Numbers } from './Numbers.tsx'
import { Sections } from './Sections.tsx'
import { VectorTable } from './VectorTable.tsx'

export function PolytopePage() {
  const { polytopeKey = '' } = useParams()
  const campaign = useCurrentCampaign()
  const polytope = useQuery(polytopeQuery(polytopeKey, campaign?.id))
  return (
    <QueryView query={polytope} what="the polytope" shape="page">
      {(detail) => <Polytope key={detail.key} polytope={detail} campaign={campaign?.id} />}
    </QueryView>
  )
}

const carriers = ['vertex', 'edge', '2-face']

function Polytope({ polytope, campaign }: { polytope: PolytopeDetail; campaign?: string }) {
  const barred = useBarred('searches.run')
  const structure = useQuery(structureQuery(polytope.key, campaign))
  const faces = useMemo(() => drawingsOf(polytope.twoFaces), [polytope])
  const suffix = campaign ? `?campaign=${campaign}` : ''
  const toricRank = polytope.points - 4
  return (
    <>
      <PageHead
        title={polytope.name}
        above={
          <Link to={`/library${suffix}`} className="hover:underline">
            Library
          </Link>
        }
        actions={
          <ActionButton
            kind="primary"
            action={{
              ...{ id: 'polytope.search', label: 'Search in this polytope', section: 'Polytope' },
              to: `/campaigns/${campaign ?? ''}/searches/new?polytopes=${polytope.key}`,
              unavailable: barred,
            }}
          />
        }
      >
        Hodge numbers ({polytope.h11}, {polytope.h21}), {polytope.origin}
        {polytope.favourable && ', favourable'}.
        {!polytope.favourable && (
          <p className="mt-1 text-ink">
            Not favourable: h11 is {polytope.h11}, the toric rank {toricRank}. The difference of{' '}
            {polytope.h11 - toricRank} is due to divisors that split into components on the threefold; volumes
            and metric are those of the toric part.
          </p>
        )}
      </PageHead>
      <Section title="Numbers" margin>
        <Numbers polytope={polytope} campaign={campaign} />
      </Section>
      <Section
        title="Classes"
        margin
        note="Fine regular triangulations that agree on all 2-faces are one class: one geometry, one candidate."
      >
        <Classes polytope={polytope.key} campaign={campaign} />
      </Section>
      <Section
        title="Reflexive sections"
        margin
        note="Planes and hyperplanes through the origin that cut out a reflexive polytope. They propose fibrations; whether a class is fibred depends on its triangulation, and its dossier says. Types are numbered F1 to F16 as in arXiv:1408.4808."
      >
        <QueryView query={structure} what="the sections">
          {({ planar, solid }) => <Sections planar={planar} solid={solid} />}
        </QueryView>
      </Section>
      <Section
        title="2-faces"
        margin
        note="Lattice polygons with all their points, each in a compact lattice basis of its plane. A candidate is a triangulation of all of them at once."
      >
        <FaceAtlas faces={faces} />
        <div className="mt-5">
          <FaceTable faces={polytope.twoFaces} />
        </div>
      </Section>
      <Section
        title="Prime toric divisors"
        margin
        note="One per point that is not interior to a facet, in the order all indices refer to. Cohomology of the structure sheaf, read off the polytope (arXiv:1712.04946); rigid: one component, h¹ = h² = 0."
      >
        <VectorTable
          label="Prime toric divisors"
          name="D"
          rows={polytope.pointCoordinates}
          columns={[
            ['Inside', false],
            ['Components', true],
            ['h¹(O)', true],
            ['h²(O)', true],
            ['χ(O)', true],
            ['Rigid', false],
          ]}
          cells={(i) => {
            const divisor = structure.data?.divisors[i]
            const waiting = structure.isError ? '–' : '…'
            return [
              carriers[polytope.carrierDimension[i] ?? 0] ?? '',
              String(polytope.components[i] ?? 1),
              divisor ? String(divisor.h1) : waiting,
              divisor ? String(divisor.h2) : waiting,
              divisor ? String(divisor.chi).replace('-', '−') : waiting,
              divisor ? (divisor.rigid ? 'yes' : 'no') : waiting,
            ]
          }}
        />
      </Section>
      <Section
        title="Facets"
        margin
        note="Normals m with ⟨m, v⟩ ≥ −1 on the polytope: the vertices of the dual."
      >
        <VectorTable
          label="Facet normals"
          name="m"
          rows={polytope.facetNormals}
          columns={[['Vertices on it', true]]}
          cells={(a) => [String(verticesOn(polytope, polytope.facetNormals[a] ?? []))]}
        />
      </Section>
      <p className="border-t pt-3 font-mono text-xs break-all text-soft">{polytope.key}</p>
    </>
  )
}

function verticesOn(polytope: PolytopeDetail, normal: readonly number[]): number {
  return polytope.pointCoordinates
    .slice(0, polytope.vertices)
    .filter((vertex) => vertex.reduce((sum, entry, axis) => sum + entry * (normal[axis] ?? 0), 0) === -1)
    .length
}
