import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { useHighlight, useHighlightStore, type Highlight } from '../../components/geometry/highlight.ts'
import { formatNumber } from '../../lib/numbers.ts'

const carriers = ['vertex', 'on an edge', 'inside a 2-face']

/** What is pointed at in the atlas, in words and numbers. Keeps its height so that nothing jumps. */
export function HighlightLine({ geometry }: { geometry: CandidateGeometry }) {
  const highlight = useHighlight()
  const kept = useHighlightStore().isKept()
  return (
    <p aria-live="polite" className="mb-2 min-h-10 sm:min-h-5 print:hidden">
      {highlight ? describe(geometry, highlight) : <span className="text-soft">Nothing is pointed at.</span>}
      {kept && <span className="text-soft"> (kept)</span>}
    </p>
  )
}

function describe(
  { polytope, divisors, secondChern, intersections }: CandidateGeometry,
  highlight: NonNullable<Highlight>,
) {
  const vector = (i: number) => `(${(polytope.pointCoordinates[i] ?? []).join(', ').replaceAll('-', '−')})`
  if (highlight.length === 1) {
    const [i] = highlight
    const divisor = divisors[i]
    return (
      <>
        <strong className="font-medium">D{i}</strong> <span className="font-mono text-xs">{vector(i)}</span>,{' '}
        {carriers[polytope.carrierDimension[i] ?? 0]}; volume {formatNumber(divisor?.volume ?? 0)}, D³ ={' '}
        {formatNumber(divisor?.cube ?? 0)}, c₂·D = {formatNumber(secondChern[i] ?? 0)}, χ(O) = {divisor?.chi}
        {divisor?.rigid && ', rigid'}
      </>
    )
  }
  const [i, j] = highlight
  const kappa = (a: number, b: number, c: number) => {
    const sorted = [a, b, c].sort((x, y) => x - y)
    return intersections.find(([x, y, z]) => x === sorted[0] && y === sorted[1] && z === sorted[2])?.[3] ?? 0
  }
  const third = intersections
    .filter(
      (row) =>
        row[3] !== 0 &&
        new Set(row.slice(0, 3)).size === 3 &&
        row.slice(0, 3).includes(i) &&
        row.slice(0, 3).includes(j),
    )
    .map(([a, b, c, value]) => `κ with D${[a, b, c].find((p) => p !== i && p !== j)} = ${value}`)
  return (
    <>
      <strong className="font-medium">
        Curve D{i} · D{j}
      </strong>
      ; κ<sub>iij</sub> = {formatNumber(kappa(i, i, j))}, κ<sub>ijj</sub> = {formatNumber(kappa(i, j, j))}
      {third.length > 0 && `; ${third.slice(0, 4).join(', ')}${third.length > 4 ? ', …' : ''}`}
    </>
  )
}
