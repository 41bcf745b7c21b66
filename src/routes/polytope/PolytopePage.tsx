import { useMemo } from 'react'
import { Link, useParams } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { type PolytopeDetail } from '../../../shared/polytopes.ts'
import { polytopeQuery } from '../../api/polytopes.ts'
import { FaceAtlas } from '../../components/geometry/FaceAtlas.tsx'
import { drawingsOf } from '../../components/geometry/faceDrawing.ts'
import { useBarred, useCurrentCampaign } from '../../components/shell/currentCampaign.tsx'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { Facts, PageHead, Section } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { QueryView } from '../../components/ui/States.tsx'
import { VectorTable } from './VectorTable.tsx'

export function PolytopePage() {
  const { polytopeKey = '' } = useParams()
  const campaign = useCurrentCampaign()
  const polytope = useQuery(polytopeQuery(polytopeKey, campaign?.id))
  return (
    <QueryView query={polytope} what="the polytope">
      {(detail) => <Polytope polytope={detail} campaign={campaign?.id} />}
    </QueryView>
  )
}

const carriers = ['vertex', 'interior to an edge', 'interior to a 2-face']

function Polytope({ polytope, campaign }: { polytope: PolytopeDetail; campaign?: string }) {
  const barred = useBarred('searches.run')
  const faces = useMemo(() => drawingsOf(polytope.twoFaces), [polytope])
  const suffix = campaign ? `?campaign=${campaign}` : ''
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
          barred || !campaign ? (
            <Button unavailable={barred || 'You are not in a campaign yet.'}>Search in this polytope</Button>
          ) : (
            <ButtonLink kind="primary" to={`/campaigns/${campaign}/searches/new?polytopes=${polytope.key}`}>
              Search in this polytope
            </ButtonLink>
          )
        }
      >
        Hodge numbers ({polytope.h11}, {polytope.h21}), {polytope.origin}
        {polytope.favourable ? ', favourable' : ', not favourable: some divisors split'}.
      </PageHead>
      <Section title="Numbers" margin>
        <div className="grid grid-cols-1 gap-x-8 sm:grid-cols-2">
          <Facts
            rows={[
              ['h11', <Num key="v" value={polytope.h11} />],
              ['h21', <Num key="v" value={polytope.h21} />],
              ['Euler number', <Num key="v" value={polytope.euler} />],
              ['Prime toric divisors (points)', <Num key="v" value={polytope.points} />],
              ['Lattice points, origin included', <Num key="v" value={polytope.latticePoints} />],
              ['Lattice points of the dual', <Num key="v" value={polytope.dualLatticePoints} />],
            ]}
          />
          <Facts
            rows={[
              ['Vertices', <Num key="v" value={polytope.vertices} />],
              ['Facets', <Num key="v" value={polytope.facets} />],
              ['2-faces', <Num key="v" value={polytope.twoFaces.length} />],
              ['Order of the symmetry group', <Num key="v" value={polytope.symmetryOrder} />],
              [
                'Made from weights',
                polytope.weights ? (
                  <span key="v" className="font-mono text-xs">
                    {polytope.weights.join(' ')} ({polytope.side})
                  </span>
                ) : (
                  '–'
                ),
              ],
              ['Mirror', <Mirror key="v" polytope={polytope} suffix={suffix} />],
            ]}
          />
        </div>
      </Section>
      <Section
        title="2-faces"
        margin
        note="Lattice polygons with all their points, each in a compact lattice basis of its plane. A candidate is a triangulation of all of them at once."
      >
        <FaceAtlas faces={faces} />
      </Section>
      <Section
        title="Points"
        margin
        note="Without those interior to a facet, in the order all indices refer to."
      >
        <VectorTable
          label="Points"
          name="D"
          rows={polytope.pointCoordinates}
          columns={['Carrier', 'Components']}
          cells={(i) => [
            carriers[polytope.carrierDimension[i] ?? 0] ?? '',
            String(polytope.components[i] ?? 1),
          ]}
        />
      </Section>
      <Section title="Facet normals" margin note="⟨m, v⟩ ≥ −1 on the polytope: the vertices of the dual.">
        <VectorTable label="Facet normals" name="m" rows={polytope.facetNormals} />
      </Section>
      <p className="border-t pt-3 font-mono text-xs break-all text-soft">{polytope.key}</p>
    </>
  )
}

function Mirror({ polytope, suffix }: { polytope: PolytopeDetail; suffix: string }) {
  if (polytope.mirrorKey === null) {
    return <span className="text-soft">not in the library</span>
  }
  if (polytope.mirrorKey === polytope.key) return <span>itself</span>
  return (
    <Link className="text-action hover:underline" to={`/library/${polytope.mirrorKey}${suffix}`}>
      ({polytope.h21}, {polytope.h11})
    </Link>
  )
}
