import { type FaceDrawing } from './faceDrawing.ts'
import { distanceToSegment, type Point2 } from './facePlane.ts'
import { type Highlight } from './highlight.ts'

/** What lies under a place in lattice coordinates: a point first, else an edge. */
export function pointedAt(face: FaceDrawing, place: Point2, unit: number): Highlight {
  let nearest: Highlight = null
  let least = Math.min(0.45, 9 / unit)
  for (const [point, [x, y]] of face.at) {
    const distance = Math.hypot(x - place[0], y - place[1])
    if (distance < least) {
      least = distance
      nearest = [point]
    }
  }
  if (nearest) return nearest
  for (const [i, j] of face.edges) {
    const a = face.at.get(i)
    const b = face.at.get(j)
    if (!a || !b) continue
    const distance = distanceToSegment(place, a, b)
    if (distance < least) {
      least = distance
      nearest = [i, j]
    }
  }
  return nearest
}

const directions: Partial<Record<string, Point2>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
}

/**
 * Where a key leads in a face: arrows to the nearest point that way (at most 60 degrees off), `e` through the
 * edges at the point in hand. Undefined for other keys.
 */
export function stepTo(face: FaceDrawing, from: Highlight, key: string): Highlight | undefined {
  const here = from && face.at.has(from[0]) ? from[0] : undefined
  if (key === 'e') {
    if (here === undefined) return undefined
    // The point in hand stays the first named, so that the next press goes on around it.
    const around = face.edges
      .filter(([i, j]) => i === here || j === here)
      .map(([i, j]): readonly [number, number] => [here, i === here ? j : i])
    const at = from?.length === 2 ? around.findIndex(([, other]) => other === from[1]) : -1
    return around[at + 1] ?? [here]
  }
  const way = directions[key]
  if (!way) return undefined
  if (here === undefined) return face.points[0] === undefined ? undefined : [face.points[0]]
  const [x, y] = face.at.get(here) ?? [0, 0]
  let best: Highlight = [here]
  let least = Infinity
  for (const [point, [px, py]] of face.at) {
    const along = (px - x) * way[0] + (py - y) * way[1]
    const aside = Math.abs((px - x) * way[1]) + Math.abs((py - y) * way[0])
    if (along <= 0 || aside > 1.75 * along) continue
    const cost = along + 2 * aside
    if (cost < least) {
      least = cost
      best = [point]
    }
  }
  return best
}
