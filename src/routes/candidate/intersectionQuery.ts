import { type CandidateGeometry } from '../../../shared/candidates.ts'

type Intersection = CandidateGeometry['intersections'][number]

/** What is asked of the sparse list: divisors that must occur, each as often as it is named, and a value. */
export interface IntersectionQuery {
  readonly divisors: readonly number[]
  readonly value: { readonly sign: '=' | '<' | '>' | '≠'; readonly number: number } | null
  /** A piece of the text that is understood as neither. */
  readonly unread: string | null
}

/** "3 3", "contains 12", "= -2", "contains 0 4 and < 0". */
export function readQuery(text: string): IntersectionQuery {
  const plain = text.replaceAll('−', '-').replaceAll('!=', '≠').replaceAll('<>', '≠')
  const found = /([=<>≠])\s*(-?\d+)/.exec(plain)
  const rest = (found ? plain.replace(found[0], ' ') : plain).replace(
    /\b(contains|with|and|κ|D)\b|[,;{}()]/gi,
    ' ',
  )
  const words = rest
    .split(/\s+/)
    .map((word) => word.replace(/^D(?=\d)/i, ''))
    .filter((word) => word !== '')
  const unread = words.find((word) => !/^\d+$/.test(word)) ?? null
  return {
    divisors: words.filter((word) => /^\d+$/.test(word)).map(Number),
    value: found ? { sign: found[1] as '=' | '<' | '>' | '≠', number: Number(found[2]) } : null,
    unread,
  }
}

/** Rows that answer a query ("3 3" asks for κ_33k). */
export function answering(
  rows: readonly Intersection[],
  { divisors, value }: IntersectionQuery,
): Intersection[] {
  return rows.filter((row) => {
    if (value) {
      const kappa = row[3]
      const { sign, number } = value
      const fits =
        sign === '='
          ? kappa === number
          : sign === '<'
            ? kappa < number
            : sign === '>'
              ? kappa > number
              : kappa !== number
      if (!fits) return false
    }
    const left = [row[0], row[1], row[2]]
    return divisors.every((index) => {
      const at = left.indexOf(index)
      if (at < 0) return false
      left.splice(at, 1)
      return true
    })
  })
}

/** The matrix κ_ijk of one divisor i over j and k: its non-zero entries with j <= k. */
export function matrixOf(
  rows: readonly Intersection[],
  i: number,
): { j: number; k: number; value: number }[] {
  return rows.flatMap(([a, b, c, value]) => {
    if (a === i) return [{ j: b, k: c, value }]
    if (b === i) return [{ j: a, k: c, value }]
    if (c === i) return [{ j: a, k: b, value }]
    return []
  })
}
