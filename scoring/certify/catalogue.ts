export type CheckGroup = 'polytope' | 'triangulation' | 'intersections' | 'cone' | 'metric' | 'score'

const entry = (group: CheckGroup, title: string) => ({ group, title })

/** Every check of a certificate in its order, with its stable id. */
export const catalogue = {
  reflexive: entry('polytope', 'The vertices are those of a reflexive polytope; number of facets'),
  faces: entry('polytope', 'Numbers of edges and 2-faces'),
  'normalised-volumes': entry('polytope', 'Normalised volumes of the polytope and its dual'),
  'lattice-points': entry('polytope', 'Lattice points, the origin and the insides of facets included'),
  'dual-lattice-points': entry('polytope', 'Lattice points of the dual polytope'),
  points: entry('polytope', 'Points that carry divisors'),
  hodge: entry('polytope', 'Hodge numbers h11, h21'),
  favourable: entry('polytope', 'Favourable: part of H11 that toric divisors miss'),
  carriers: entry('polytope', 'Dimensions of the points’ carriers'),
  components: entry('polytope', 'Numbers of components of the divisors'),
  'dual-interior': entry('polytope', 'Points inside the faces dual to the carriers'),
  'polytope-key': entry('polytope', 'The polytope’s key hashes the vertices'),
  'heights-generic': entry('triangulation', 'The heights tie on no facet; number of maximal cones'),
  'cones-full': entry('triangulation', 'All maximal cones are non-degenerate; index of the largest'),
  volume: entry('triangulation', 'The cones fill the polytope: sum of their lattice volumes'),
  'points-used': entry('triangulation', 'Every point is used'),
  regular: entry('triangulation', 'Every wall is strictly convex; depth of the origin'),
  simplices: entry('triangulation', 'Maximal cones of the fan'),
  triangles: entry('triangulation', 'Triangles of the 2-faces: the class'),
  'candidate-key': entry('triangulation', 'The candidate’s key hashes the polytope’s key and the triangles'),
  'linear-relations': entry('intersections', 'Linear relations of the toric variety that have no solution'),
  'intersection-numbers': entry('intersections', 'Triple intersection numbers, non-zero ones'),
  'second-chern': entry('intersections', 'Second Chern class on the divisors'),
  euler: entry('intersections', 'Euler number from intersection numbers and from Hodge numbers'),
  noether: entry('intersections', 'Noether’s formula on every divisor'),
  'edge-curves': entry('cone', 'Volumes of all edge curves at the reference point'),
  circuits: entry('cone', 'All circuits of the inner cone at the reference point'),
  'kaehler-fan': entry('cone', 'The fan of the reference point has the class’s triangles'),
  'edge-curves-suffice': entry('cone', 'The edge curves alone fix the reference point'),
  'reference-point': entry('cone', 'The reference point has the least norm'),
  'volume-total': entry('metric', 'Volume of the threefold'),
  'divisor-volumes': entry('metric', 'Volumes of the prime toric divisors'),
  'divisor-spectrum': entry('metric', 'Field-space metric, divisor spectrum, by full decomposition'),
  'top-eigenvalue': entry('metric', 'Largest eigenvalue, as candidates are ranked by it'),
  'metric-differences': entry('metric', 'Field-space metric by central differences of K'),
  'lattice-basis': entry('metric', 'Lattice basis of the divisor classes'),
  'basis-spectrum': entry('metric', 'Field-space metric, basis spectrum, by full decomposition'),
  score: entry('score', 'The score from certified numbers'),
  hit: entry('score', 'Whether it is a hit'),
  report: entry('score', 'The report’s columns'),
} as const satisfies Record<string, { readonly group: CheckGroup; readonly title: string }>

export type CheckId = keyof typeof catalogue
