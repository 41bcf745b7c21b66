/**
 * All lattice points of the polytope { x : <m, x> >= -1 for every facet }, 4 coordinates each, in no particular
 * order. Loops over the three coordinates of smallest extent and solves the fourth from the facets, so it wants
 * a reduced basis (a sheared polytope has a huge bounding box).
 *
 * @param vertices the polytope's vertices, 4 coordinates each: they give the extents
 * @param facets normals, 4 coordinates each
 */
export function latticePointsOf(vertices: ArrayLike<number>, facets: ArrayLike<number>): number[] {
  const least = [Infinity, Infinity, Infinity, Infinity]
  const most = [-Infinity, -Infinity, -Infinity, -Infinity]
  for (let i = 0; i < vertices.length; i++) {
    least[i & 3] = Math.min(least[i & 3], vertices[i])
    most[i & 3] = Math.max(most[i & 3], vertices[i])
  }
  const axes = [0, 1, 2, 3].sort((a, b) => most[a] - least[a] - (most[b] - least[b]) || a - b)
  const [first, second, third, last] = axes
  const facetCount = facets.length / 4
  const afterFirst = new Float64Array(facetCount)
  const afterSecond = new Float64Array(facetCount)
  const found: number[] = []
  const point = [0, 0, 0, 0]
  for (let x = least[first]; x <= most[first]; x++) {
    point[first] = x
    for (let a = 0; a < facetCount; a++) afterFirst[a] = 1 + facets[4 * a + first] * x
    for (let y = least[second]; y <= most[second]; y++) {
      point[second] = y
      for (let a = 0; a < facetCount; a++) afterSecond[a] = afterFirst[a] + facets[4 * a + second] * y
      for (let z = least[third]; z <= most[third]; z++) {
        point[third] = z
        let low = least[last]
        let high = most[last]
        for (let a = 0; a < facetCount && low <= high; a++) {
          const rest = afterSecond[a] + facets[4 * a + third] * z
          const slope = facets[4 * a + last]
          if (slope > 0) low = Math.max(low, Math.ceil(-rest / slope))
          else if (slope < 0) high = Math.min(high, Math.floor(rest / -slope))
          else if (rest < 0) high = low - 1
        }
        for (let w = low; w <= high; w++) {
          point[last] = w
          found.push(point[0], point[1], point[2], point[3])
        }
      }
    }
  }
  return found
}
