import { type ReactNode } from 'react'
import { Link } from 'react-router-dom'
import { type CandidateGeometry } from '../../../../shared/candidates.ts'
import { Num } from '../../../components/ui/Num.tsx'
import { Table, Td, Th } from '../../../components/ui/Table.tsx'
import { volumePrecision } from './candidateDifferences.ts'

type Fact = readonly [name: string, of: (geometry: CandidateGeometry) => number | string]

const least = (values: readonly { volume: number }[]) => Math.min(...values.map(({ volume }) => volume))

const facts: readonly Fact[] = [
  ['Polytope', ({ polytope }) => polytope.name],
  ['Hodge numbers', ({ polytope }) => `(${polytope.h11}, ${polytope.h21})`],
  ['Euler number', ({ polytope }) => polytope.euler],
  ['Favourable', ({ polytope }) => (polytope.favourable ? 'yes' : 'no')],
  ['Prime toric divisors', ({ divisors }) => divisors.length],
  ['of these rigid', ({ divisors }) => divisors.filter(({ rigid }) => rigid).length],
  ['Triangles', ({ triangles }) => triangles.length],
  ['Intersection numbers other than 0', ({ intersections }) => intersections.length],
  ['K3 fibrations', ({ fibrations }) => fibrations.k3.length],
  ['Genus-one fibrations', ({ fibrations }) => fibrations.genusOne.length],
  ['Volume of the threefold', ({ reference }) => reference.volume],
  ['Norm of the reference point', ({ reference }) => reference.norm],
  ['Least divisor volume', ({ divisors }) => least(divisors)],
  ['Largest divisor volume', ({ divisors }) => Math.max(...divisors.map(({ volume }) => volume))],
  ['Cone: edge curves suffice', ({ reference }) => (reference.edgeCurvesSuffice ? 'yes' : 'no')],
  ['Largest eigenvalue, divisor spectrum', ({ topEigenvalue }) => topEigenvalue],
]

const agree = (a: number | string, b: number | string): boolean =>
  typeof a === 'number' && typeof b === 'number'
    ? Math.abs(a - b) <= volumePrecision * Math.max(Math.abs(a), Math.abs(b))
    : a === b

/** What two candidates are, line by line; what differs is marked. */
export function FactTable({
  a,
  b,
  addressOf,
}: {
  a: CandidateGeometry
  b: CandidateGeometry
  addressOf: (key: string) => string
}) {
  const shown = (value: number | string): ReactNode =>
    typeof value === 'number' ? <Num value={value} digits={6} /> : value
  return (
    <Table label="Facts of both candidates" className="max-sm:table-fixed">
      <thead>
        <tr>
          <Th>
            <span className="sr-only">Fact</span>
          </Th>
          {([a, b] as const).map(({ key }, place) => (
            <Th key={key} numeric className="whitespace-normal">
              {'AB'[place]}{' '}
              <Link to={addressOf(key)} className="font-mono text-action hover:underline">
                {key.slice(0, 10)}
              </Link>
            </Th>
          ))}
          <Th className="max-sm:w-14">Differs</Th>
        </tr>
      </thead>
      <tbody>
        {facts.map(([name, of]) => {
          const values = [of(a), of(b)] as const
          return (
            <tr key={name}>
              <Td className="py-1 text-soft whitespace-normal">{name}</Td>
              {values.map((value, place) => (
                <Td key={place} numeric className="whitespace-normal [overflow-wrap:anywhere]">
                  {shown(value)}
                </Td>
              ))}
              <Td>{agree(...values) ? <span className="text-soft">–</span> : 'yes'}</Td>
            </tr>
          )
        })}
      </tbody>
    </Table>
  )
}
