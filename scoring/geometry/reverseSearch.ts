import { InvariantError } from '../errors.ts'
import { circuits } from './circuits.ts'
import { flip } from './flips.ts'
import type { Polytope } from './polytope.ts'
import { isRegular } from './regularity.ts'
import { referenceClass, type TwoFaceClass } from './twoFaceClass.ts'

/** Where a walk stands: the exchanges that lead to it from the first class, and how far each class was looked at. */
export interface WalkPosition {
  /** i, j of the edges exchanged on the way, one pair after the other. */
  readonly path: readonly number[]
  /** Per class on the way, the last one included: number of its flippable edges that are done with. */
  readonly done: readonly number[]
}

/** An edge i j that can be exchanged for the other diagonal k l of its parallelogram. */
interface Exchange {
  readonly i: number
  readonly j: number
  readonly k: number
  readonly l: number
}

interface Level {
  readonly class: TwoFaceClass
  /** Integer heights that give the class, every circuit positive. */
  readonly heights: Float64Array
  readonly exchanges: readonly Exchange[]
  done: number
}

/**
 * All fine regular classes of a polytope, each once, without a list of those already seen: reverse search (Avis,
 * Fukuda, Discrete Applied Mathematics 65 (1996) 21). So the walk's whole state is a short path, whatever the
 * number of classes.
 *
 * Let w be heights strictly inside the first class. Any other class has a wall that separates it from w, since w
 * is in no other closed cone; that wall is not one of the fine cone, which holds w; so across it lies one exchange
 * of a diagonal with a regular result, and one whose circuit is negative on w. A class's *parent* is the result
 * of the first such exchange, in the order of edges. The surface that w spans over the triangulation gets lower
 * with each of these exchanges, so parents lead to the first class and to it alone: a tree on all classes, which
 * is walked depth first. Neighbours that have another parent are met again elsewhere.
 */
export class ReverseSearch {
  private readonly levels: Level[]
  private readonly path: number[] = []
  private readonly root: Float64Array

  /** @param position as `position()` gave it; absent: at the first class */
  constructor(polytope: Polytope, position: WalkPosition = { path: [], done: [0] }) {
    const first = referenceClass(polytope)
    const start = isRegular(first)
    if (!start.regular) throw new InvariantError('The reference class is not regular.')
    this.root = start.heights
    this.levels = [{ class: first, heights: start.heights, exchanges: exchangesOf(first), done: 0 }]
    for (let n = 0; n < position.path.length; n += 2) {
      this.top.done = position.done[n / 2]
      this.enter({ i: position.path[n], j: position.path[n + 1] })
    }
    this.top.done = position.done[position.path.length / 2]
  }

  position(): WalkPosition {
    return { path: [...this.path], done: this.levels.map(({ done }) => done) }
  }

  /** The class where the walk stands. */
  get class(): TwoFaceClass {
    return this.top.class
  }

  /** Integer heights that give it, every circuit positive. */
  get heights(): Float64Array {
    return this.top.heights
  }

  /** Goes to the next class; false when all have been met. */
  next(): boolean {
    for (;;) {
      const { top } = this
      while (top.done < top.exchanges.length) {
        const exchange = top.exchanges[top.done++]
        const child = this.childAcross(exchange)
        if (child === undefined) continue
        this.levels.push(child)
        this.path.push(exchange.i, exchange.j)
        return true
      }
      if (this.levels.length === 1) return false
      this.levels.pop()
      this.path.length -= 2
    }
  }

  private get top(): Level {
    return this.levels[this.levels.length - 1]
  }

  /** The class across a wall when it is regular and its parent is the one where the walk stands. */
  private childAcross(exchange: Exchange): Level | undefined {
    if (this.rise(exchange) <= 0) return undefined
    const { class: cls, heights: near } = this.top
    const child = exchanged(cls, exchange)
    const exchanges = exchangesOf(child)
    for (const other of exchanges) {
      if (other.i === exchange.k && other.j === exchange.l) break
      if (this.rise(other) < 0 && isRegular(exchanged(child, other), { near }).regular) return undefined
    }
    const answer = isRegular(child, { near })
    return answer.regular ? { class: child, heights: answer.heights, exchanges, done: 0 } : undefined
  }

  /** The circuit of an edge that can be exchanged, on the first class's heights. */
  private rise({ i, j, k, l }: Exchange): number {
    const { root } = this
    return root[k] + root[l] - root[i] - root[j]
  }

  /** Steps into a child that was found before. */
  private enter(edge: { readonly i: number; readonly j: number }): void {
    const { class: cls, heights: near } = this.top
    const child = exchanged(cls, edge)
    const answer = isRegular(child, { near })
    if (!answer.regular) throw new InvariantError('The path of a walk leads to a class that is not regular.')
    this.levels.push({ class: child, heights: answer.heights, exchanges: exchangesOf(child), done: 0 })
    this.path.push(edge.i, edge.j)
  }
}

function exchangesOf(cls: TwoFaceClass): Exchange[] {
  const { count, i, j, k, l, a } = circuits(cls)
  const exchanges: Exchange[] = []
  for (let row = 0; row < count; row++) {
    if (a[row] === 1) exchanges.push({ i: i[row], j: j[row], k: k[row], l: l[row] })
  }
  return exchanges
}

function exchanged(cls: TwoFaceClass, edge: { readonly i: number; readonly j: number }): TwoFaceClass {
  const other = flip(cls, edge)
  if (other === undefined) throw new InvariantError('An edge of a parallelogram cannot be exchanged.')
  return other
}
