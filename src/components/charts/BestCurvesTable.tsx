import { Num } from '../ui/Num.tsx'
import { Table, Td, Th } from '../ui/Table.tsx'
import { bestAt, type NullCurves, type RunCurve } from './runCurves.ts'

/** The numbers behind `BestCurves`: what each run has after n evaluations, beside the null's. */
export function BestCurvesTable({
  runs,
  sample,
  counts,
}: {
  runs: readonly RunCurve[]
  sample: NullCurves | null
  counts: readonly number[]
}) {
  const expected = new Map(sample?.expected)
  const range = new Map(sample?.range.map(([n, low, high]) => [n, { low, high }]))
  return (
    <Table label="Best score over evaluations">
      <thead>
        <tr>
          <Th numeric>Evaluations</Th>
          {runs.map(({ label }, n) => (
            <Th key={n} numeric>
              {label}
            </Th>
          ))}
          {sample && (
            <>
              <Th numeric>Expected from the null</Th>
              <Th numeric>5 % below</Th>
              <Th numeric>5 % above</Th>
            </>
          )}
        </tr>
      </thead>
      <tbody>
        {counts.map((n) => (
          <tr key={n}>
            <Td numeric>
              <Num value={n} />
            </Td>
            {runs.map((run, at) => (
              <Td key={at} numeric>
                <Num value={bestAt(run, n)} digits={6} />
              </Td>
            ))}
            {sample && (
              <>
                <Td numeric>
                  <Num value={expected.get(n) ?? null} digits={6} />
                </Td>
                <Td numeric>
                  <Num value={range.get(n)?.low ?? null} digits={6} />
                </Td>
                <Td numeric>
                  <Num value={range.get(n)?.high ?? null} digits={6} />
                </Td>
              </>
            )}
          </tr>
        ))}
      </tbody>
    </Table>
  )
}
