import { type ReactNode } from 'react'
import { type AssemblyCounts, type AssemblySettings } from '../../../shared/assemblies.ts'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { Num } from '../ui/Num.tsx'

/** From finds to list: what every choice left out. Limits that were not set are not mentioned. */
export function AssemblyCountsView({
  counts,
  size,
  assembly,
  live,
}: {
  counts: AssemblyCounts
  size: number
  assembly: AssemblySettings
  /** Read out when it changes. */
  live?: boolean
}) {
  const { leftOut } = counts
  const { perPolytope, apart, perInvariants, pareto, feasibleOnly } = assembly
  const steps: (readonly [ReactNode, number] | null)[] = [
    leftOut.broken > 0 ? ['could not be scored', leftOut.broken] : null,
    feasibleOnly ? ['infeasible or undefined', leftOut.infeasible] : null,
    pareto ? ['undefined in a column of the fronts', leftOut.withoutValue] : null,
    perPolytope === null ? null : [`more than ${perPolytope} of a polytope`, leftOut.polytope],
    perInvariants === null ? null : [`more than ${perInvariants} of equal invariants`, leftOut.invariants],
    apart === null ? null : [`fewer than ${apart} triangles from a better one`, leftOut.near],
    ['after the list was full', leftOut.beyond],
  ]
  return (
    <div>
      <table className="w-full border-collapse text-sm">
        <caption className="sr-only">From finds to list</caption>
        <tbody>
          <Line
            name="Distinct candidates"
            value={counts.distinct}
            note={`of ${counted(counts.finds, 'find')}`}
          />
          {steps.flatMap((step, at) =>
            step === null ? [] : [<Line key={at} name={step[0]} value={-step[1]} soft={step[1] === 0} />],
          )}
          <Line name="In the list" value={size} strong />
        </tbody>
      </table>
      <p aria-live={live ? 'polite' : undefined} className={live ? 'sr-only' : 'hidden'}>
        {counted(size, 'candidate')} in the list.
      </p>
      {counts.firstFront !== null && (
        <p className="mt-2 text-xs text-soft">
          {counted(counts.firstFront, 'candidate')} on the first front
          {counts.firstFront > size && ', more than the list holds'}.
        </p>
      )}
      {perInvariants !== null && counts.withoutInvariants > 0 && (
        <p className="mt-2 text-xs text-soft">
          The invariants of {formatNumber(counts.withoutInvariants)}{' '}
          {live ? 'are still being computed; they are' : 'were not known; they were'} not limited.
        </p>
      )}
    </div>
  )
}

function Line({
  name,
  value,
  note,
  soft,
  strong,
}: {
  name: ReactNode
  value: number
  note?: string
  soft?: boolean
  strong?: boolean
}) {
  return (
    <tr className={strong ? 'font-medium' : soft ? 'text-soft' : ''}>
      <th scope="row" className={`border-b py-1 pr-3 text-left ${strong ? 'font-medium' : 'font-normal'}`}>
        {name}
        {note && <span className="text-soft"> {note}</span>}
      </th>
      <td className="border-b py-1 text-right tabular-nums">
        <Num value={Object.is(value, -0) ? 0 : value} />
      </td>
    </tr>
  )
}
