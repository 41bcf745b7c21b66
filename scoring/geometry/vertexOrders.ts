/**
 * Orderings of the vertices that depend on nothing but the pairing matrix <m_a, v_i>, by individualisation and
 * refinement: cells of alike vertices are split by their pairings with cells of facets until nothing changes, then
 * every member of the first smallest cell is singled out in turn. Of the branches on a level only those that look
 * alike in the best way are kept.
 *
 * Which of the branches that is depends on the hash function, and with it the normal form: it is part of every
 * polytope's permanent address and must stay as it is.
 *
 * Relabelling vertices or facets relabels the result and changes nothing else, so the set of orderings is closed
 * under every symmetry of the pairing matrix. Hashes decide only how finely cells are split: a collision would make
 * the set larger, never wrong.
 *
 * @param pairing vertexCount x facetCount, a row per vertex
 * @returns orderings: the vertex in each position; never empty
 */
export function vertexOrders(
  pairing: ArrayLike<number>,
  vertexCount: number,
  facetCount: number,
): number[][] {
  const matrix = new Int32Array(vertexCount * facetCount)
  for (let i = 0; i < matrix.length; i++) matrix[i] = mix(1, pairing[i])
  let level = [refine(matrix, new Int32Array(vertexCount), new Int32Array(facetCount))]
  while (level[0].cells < vertexCount) {
    let best: Colouring[] = []
    for (const colouring of level) {
      for (const vertex of smallestCell(colouring.vertices, colouring.cells)) {
        const vertices = colouring.vertices.map((colour, v) => 2 * colour + (v === vertex ? 0 : 1))
        const branch = refine(matrix, vertices, colouring.facets)
        const order = best.length === 0 ? -1 : best[0].cells - branch.cells || branch.trace - best[0].trace
        if (order < 0) best = [branch]
        else if (order === 0) best.push(branch)
      }
    }
    level = best
  }
  return level.map(({ vertices }) => {
    const order = new Array<number>(vertexCount)
    vertices.forEach((position, vertex) => (order[position] = vertex))
    return order
  })
}

interface Colouring {
  /** Cell of each vertex, 0 .. cells - 1. */
  readonly vertices: Int32Array
  readonly facets: Int32Array
  readonly cells: number
  /** Hash of everything that was seen on the way. */
  readonly trace: number
}

/**
 * Refines until no cell splits any more, or all vertices are told apart.
 *
 * @param matrix hashes of the pairings, a row per vertex
 */
function refine(matrix: Int32Array, vertexColours: Int32Array, facetColours: Int32Array): Colouring {
  const facetCount = facetColours.length
  const vertexCount = vertexColours.length
  let trace = 0
  let vertices = vertexColours
  let facets = facetColours
  let cells = -1
  for (;;) {
    const facetHashes = new Int32Array(facetCount)
    for (let v = 0, at = 0; v < vertexCount; v++) {
      const colour = mix(2, vertices[v])
      for (let a = 0; a < facetCount; a++, at++) facetHashes[a] += Math.imul(colour, matrix[at])
    }
    const facetCells = split(facets, facetHashes)
    facets = facetCells.colours
    const facetMixes = facets.map((colour) => mix(3, colour))
    const vertexHashes = new Int32Array(vertexCount)
    for (let v = 0, at = 0; v < vertexCount; v++) {
      let sum = 0
      for (let a = 0; a < facetCount; a++, at++) sum = (sum + Math.imul(facetMixes[a], matrix[at])) | 0
      vertexHashes[v] = sum
    }
    const vertexCells = split(vertices, vertexHashes)
    vertices = vertexCells.colours
    trace = mix(mix(trace, facetCells.trace), vertexCells.trace)
    const total = facetCells.count + vertexCells.count
    if (total === cells || vertexCells.count === vertexCount) {
      return { vertices, facets, cells: vertexCells.count, trace }
    }
    cells = total
  }
}

/** Splits cells by hashes: the new colour is the rank of (old colour, hash). */
function split(
  colours: Int32Array,
  hashes: Int32Array,
): { colours: Int32Array; count: number; trace: number } {
  const length = colours.length
  const order = new Int32Array(length)
  // Insertion: a few dozen items at most.
  for (let i = 0; i < length; i++) {
    let position = i
    for (; position > 0; position--) {
      const other = order[position - 1]
      const difference = colours[other] - colours[i] || hashes[other] - hashes[i]
      if (difference <= 0) break
      order[position] = other
    }
    order[position] = i
  }
  const next = new Int32Array(length)
  let count = 0
  let trace = 0
  for (let position = 0; position < length; position++) {
    const item = order[position]
    if (position > 0) {
      const before = order[position - 1]
      if (colours[item] !== colours[before] || hashes[item] !== hashes[before]) count++
    }
    next[item] = count
    trace = mix(mix(trace, count), hashes[item])
  }
  return { colours: next, count: count + 1, trace }
}

function smallestCell(colours: Int32Array, cells: number): number[] {
  const members: number[][] = Array.from({ length: cells }, () => [])
  colours.forEach((colour, vertex) => members[colour].push(vertex))
  return members.reduce((best, cell) =>
    cell.length > 1 && (best.length < 2 || cell.length < best.length) ? cell : best,
  )
}

/** A 32-bit hash of two integers; the multipliers are odd numbers without small structure. */
function mix(a: number, b: number): number {
  let hash = Math.imul(a + 0x7f4a7c15, 0x2c1b3c6d) ^ Math.imul(b + 0x165667b1, 0x297a2d39)
  hash = Math.imul(hash ^ (hash >>> 15), 0x85ebca6b)
  hash = Math.imul(hash ^ (hash >>> 13), 0xc2b2ae35)
  return hash ^ (hash >>> 16)
}
