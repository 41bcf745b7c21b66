import { type ReactNode } from 'react'
import { type PolytopeDetail } from '../../../shared/polytopes.ts'
import { Facts } from '../../components/ui/Layout.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Mirror } from './Mirror.tsx'

/** The numbers of a polytope that need no triangulation, and the way to its mirror. */
export function Numbers({ polytope, campaign }: { polytope: PolytopeDetail; campaign?: string }) {
  const number = (name: ReactNode, value: number | null): [ReactNode, ReactNode] => [
    name,
    <Num key="v" value={value} />,
  ]
  return (
    <div className="grid grid-cols-1 gap-x-8 sm:grid-cols-2 xl:grid-cols-3">
      <Facts
        rows={[
          number('h11', polytope.h11),
          number('h21', polytope.h21),
          number('Euler number', polytope.euler),
          ['Mirror', <Mirror key="v" polytope={polytope} campaign={campaign} />],
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
          number('Normalised volume', polytope.normalisedVolume),
          number('of the dual', polytope.dualNormalisedVolume),
        ]}
      />
      <Facts
        rows={[
          number('Prime toric divisors', polytope.points),
          number('on vertices', polytope.vertices),
          number('interior to edges', polytope.edgePoints),
          number('interior to 2-faces', polytope.facePoints),
          number('Points interior to facets', polytope.facetPoints),
          number('Lattice points, origin included', polytope.latticePoints),
          number('of the dual', polytope.dualLatticePoints),
        ]}
      />
      <Facts
        rows={[
          number('Vertices', polytope.vertices),
          number('Edges', polytope.edges),
          number('2-faces', polytope.twoFaces.length),
          number('Facets', polytope.facets),
          number('Order of the symmetry group', polytope.symmetryOrder),
          number('Rigid divisors', polytope.rigidDivisors),
          number('Divisors that split', polytope.splitDivisors),
          number('Rank of rigid classes', polytope.rigidRank),
        ]}
      />
    </div>
  )
}
