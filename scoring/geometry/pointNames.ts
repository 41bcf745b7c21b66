/** How messages name a point of the polytope: by its index, or as the person who gave the points would. */
export type PointNames = (point: number) => string

/** `(3, 4, 7)`. */
export const listed = (points: readonly number[], name: PointNames): string =>
  `(${points.map((point) => name(point)).join(', ')})`
