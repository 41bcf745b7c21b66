import { paretoFronts } from './paretoFronts.ts'
import { compareContenders, distinctBest, type Contender } from './rankOrder.ts'

/** How a list is drawn from the merged runs. */
export interface AssemblyRule {
  /** At most this many candidates. */
  readonly size: number
  /** Leaves out what a requirement refuses, and what has no value. */
  readonly feasibleOnly: boolean
  /** Rank by Pareto fronts of the contenders' columns, each of which is to be large or small; absent: by score alone. */
  readonly pareto?: readonly ('max' | 'min')[]
  /** At most this many candidates of one polytope. */
  readonly perPolytope?: number
  /** At most this many of one key of basis-independent integers; those without a known key are not limited. */
  readonly perInvariants?: number
  /** Whether a candidate may stand beside those taken so far, by the difference of classes. Asked last, once each. */
  readonly admit?: (key: string) => boolean
}

/** Why a candidate is not in the list: the first of these that applied. */
export interface LeftOut {
  /** Infeasible or undefined, where only feasible ones were asked for. */
  infeasible: number
  /** A column of the fronts is undefined. */
  withoutValue: number
  /** The polytope had as many as allowed. */
  polytope: number
  /** The invariants had as many as allowed. */
  invariants: number
  /** Too near a better one on the same polytope. */
  near: number
  /** The list was full before its turn came. */
  beyond: number
}

export interface Assembly<C extends Contender> {
  /** Best first; `front` is null where no fronts were taken. */
  readonly chosen: readonly { readonly contender: C; readonly front: number | null }[]
  /** Different candidates that were considered: those chosen and those left out add up to it. */
  readonly distinct: number
  readonly leftOut: Readonly<LeftOut>
  /** Among those looked at before the list was full, how many have no known invariants. */
  readonly withoutInvariants: number
  /** Candidates on the first front, whether chosen or not; null where no fronts were taken. */
  readonly firstFront: number | null
}

/**
 * The best distinct candidates of merged runs, thinned out. The result depends on the set of contenders only, not on
 * their order:
 *
 * 1. Every candidate once; infeasible ones may be left out.
 * 2. A total order: by score, equal scores by key; or by number of the Pareto front among all that are left, and
 *    by score and key within a front. A candidate with an undefined column is left out then.
 * 3. Along that order a candidate is taken unless the ones taken before it already have as many of its polytope, or of
 *    its invariants, as allowed, or one of them is too near; until the list is full.
 *
 * So the best of all is always in the list, a candidate is left out only in favour of better ones, and a front that
 * does not fit whole is cut by score.
 */
export function assemble<C extends Contender>(contenders: readonly C[], rule: AssemblyRule): Assembly<C> {
  const distinct = distinctBest(contenders)
  const leftOut: LeftOut = { infeasible: 0, withoutValue: 0, polytope: 0, invariants: 0, near: 0, beyond: 0 }
  const feasible = rule.feasibleOnly
    ? distinct.filter(({ outcome }) => outcome.kind === 'feasible')
    : distinct
  leftOut.infeasible = distinct.length - feasible.length
  const order = inFronts(feasible, rule.pareto)
  leftOut.withoutValue = feasible.length - order.length

  const perPolytope = new Map<string, number>()
  const perInvariants = new Map<string, number>()
  const chosen: { contender: C; front: number | null }[] = []
  let withoutInvariants = 0
  for (const [place, entry] of order.entries()) {
    if (chosen.length >= rule.size) {
      leftOut.beyond = order.length - place
      break
    }
    const { key, polytopeKey, invariantKey } = entry.contender
    if (invariantKey === undefined) withoutInvariants++
    const onPolytope = perPolytope.get(polytopeKey) ?? 0
    const ofInvariants = invariantKey === undefined ? 0 : (perInvariants.get(invariantKey) ?? 0)
    if (onPolytope >= (rule.perPolytope ?? Infinity)) leftOut.polytope++
    else if (ofInvariants >= (rule.perInvariants ?? Infinity)) leftOut.invariants++
    else if (rule.admit !== undefined && !rule.admit(key)) leftOut.near++
    else {
      chosen.push(entry)
      perPolytope.set(polytopeKey, onPolytope + 1)
      if (invariantKey !== undefined) perInvariants.set(invariantKey, ofInvariants + 1)
    }
  }
  const firstFront = rule.pareto === undefined ? null : order.filter(({ front }) => front === 1).length
  return { chosen, distinct: distinct.length, leftOut, withoutInvariants, firstFront }
}

/** By front and, within it, as before; those on no front drop out. Without columns all stay as they are. */
function inFronts<C extends Contender>(
  sorted: readonly C[],
  pareto: AssemblyRule['pareto'],
): { contender: C; front: number | null }[] {
  if (pareto === undefined) return sorted.map((contender) => ({ contender, front: null }))
  const fronts = paretoFronts(
    sorted.map(({ columns }) =>
      pareto.map((direction, axis) => {
        const value = columns?.[axis] ?? null
        return value === null || direction === 'max' ? value : -value
      }),
    ),
  )
  return sorted
    .flatMap((contender, at) => {
      const front = fronts[at]
      return front === null ? [] : [{ contender, front }]
    })
    .sort((a, b) => a.front - b.front || compareContenders(a.contender, b.contender))
}
