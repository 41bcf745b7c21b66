import { divisorTopology, polytopeFromPoints, reflexiveSections } from '../../../scoring/index.ts'
import type { PolytopeStructure } from '../../../shared/polytopeStructure.ts'

/** @param vertices in normal-form coordinates, so that indices are those of the polytope's page */
export function polytopeStructure({
  vertices,
}: {
  readonly vertices: readonly (readonly number[])[]
}): PolytopeStructure {
  const polytope = polytopeFromPoints(vertices)
  const { chi, h1, h2, components, rigid } = divisorTopology(polytope)
  const { planar, solid, nested } = reflexiveSections(polytope)
  return {
    divisors: Array.from(chi, (value, i) => ({
      chi: value,
      h1: h1[i],
      h2: h2[i],
      components: components[i],
      rigid: rigid[i] === 1,
    })),
    planar: planar.map(({ type, turns, points }) => ({
      type,
      outline: outlineOf(turns),
      points: [...points].filter((point) => point < polytope.pointCount).sort((a, b) => a - b),
    })),
    solid: solid.map(({ vertices: corners, points }, at) => ({
      vertices: [...corners],
      latticePoints: points.length + 1,
      nested: [...nested[at]],
    })),
  }
}

/** Neighbours around a reflexive polygon form a basis, and v_{i+1} = a_i v_i - v_{i-1} gives all from the first two. */
export function outlineOf(turns: ArrayLike<number>): [number, number][] {
  const outline: [number, number][] = [
    [1, 0],
    [0, 1],
  ]
  for (let i = 1; i + 1 < turns.length; i++) {
    const [[ax, ay], [bx, by]] = [outline[i - 1], outline[i]]
    outline.push([turns[i] * bx - ax + 0, turns[i] * by - ay + 0])
  }
  return outline
}
