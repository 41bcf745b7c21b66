import { type CertificateCheck, type CertificateReport } from '../../../shared/certificates.ts'
import { formatNumber } from '../../lib/numbers.ts'
import { Num } from '../ui/Num.tsx'
import { Th } from '../ui/Table.tsx'

const groups: Record<string, string> = {
  polytope: 'Polytope',
  triangulation: 'Triangulation',
  intersections: 'Intersection numbers',
  cone: 'Kähler cone',
  metric: 'Field-space metric',
  score: 'Score',
}
const results = {
  pass: { word: 'agrees', look: 'text-verified' },
  fail: { word: 'FAILS', look: 'font-medium text-rejected' },
  'not-done': { word: 'not done', look: 'text-soft' },
} as const

/** Every comparison of a certificate with both numbers; on paper nothing is cut off. */
export function CheckTable({ checks }: { checks: CertificateReport['checks'] }) {
  const order = [...new Set(checks.map(({ group }) => group))]
  return (
    <div
      className="relative overflow-x-auto print:overflow-visible"
      tabIndex={0}
      role="group"
      aria-label="Comparisons, scrolls"
    >
      <table className="w-full border-collapse text-sm">
        <caption className="sr-only">Comparisons</caption>
        <thead>
          <tr>
            <Th>Comparison</Th>
            <Th>Result</Th>
            <Th numeric>Fast road</Th>
            <Th numeric>Independent road</Th>
            <Th numeric>Tolerance</Th>
            <Th numeric>Time</Th>
          </tr>
        </thead>
        {order.map((group) => (
          <tbody key={group} className="break-inside-avoid">
            <tr>
              <th
                scope="rowgroup"
                colSpan={6}
                className="pt-3 pb-1 text-left font-serif text-sm font-semibold"
              >
                {groups[group] ?? group}
              </th>
            </tr>
            {checks
              .filter((check) => check.group === group)
              .map((check) => (
                <Check key={check.id} check={check} />
              ))}
          </tbody>
        ))}
      </table>
    </div>
  )
}

const cell = 'border-b px-2 py-1 align-top last:pr-0'

function Check({ check }: { check: CertificateCheck }) {
  const { word, look } = results[check.result]
  return (
    <tr id={`check-${check.id}`}>
      <th scope="row" className="min-w-56 border-b py-1 pr-2 text-left font-normal">
        {check.title}
        {check.note !== '' && <span className="block text-xs text-soft">{check.note}</span>}
      </th>
      <td className={`${cell} whitespace-nowrap ${look}`}>{word}</td>
      <td className={`${cell} text-right`}>
        <Value value={check.fast} />
      </td>
      <td className={`${cell} text-right`}>
        <Value value={check.independent} />
      </td>
      <td className={`${cell} text-right whitespace-nowrap`}>
        {check.tolerance === null ? (
          <span className="text-soft">exact</span>
        ) : (
          <Num value={check.tolerance} digits={2} />
        )}
      </td>
      <td className={`${cell} text-right whitespace-nowrap tabular-nums`}>{duration(check.milliseconds)}</td>
    </tr>
  )
}

/** Both numbers in full, so that a difference in the last digits can be seen. */
function Value({ value }: { value: CertificateCheck['fast'] }) {
  if (value === null) return <span className="text-soft">–</span>
  if (typeof value === 'number') return <Num value={value} digits={12} />
  return (
    <span data-raw={value} className="inline-block max-w-72 font-mono text-xs break-words">
      {value}
    </span>
  )
}

function duration(milliseconds: number): string {
  if (milliseconds < 1) return '< 1 ms'
  return milliseconds < 10_000
    ? `${formatNumber(Math.round(milliseconds))} ms`
    : `${(milliseconds / 1000).toFixed(1)} s`
}
