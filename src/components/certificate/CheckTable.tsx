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
            {['Fast road', 'Independent road', 'Tolerance', 'Time'].map((name) => (
              <Th key={name} numeric className={wide}>
                {name}
              </Th>
            ))}
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

/** On narrow screens the numbers stand under the title instead. */
const wide = 'hidden sm:table-cell print:table-cell'
const cell = 'border-b px-2 py-1 align-top last:pr-0'

function Check({ check }: { check: CertificateCheck }) {
  const { word, look } = results[check.result]
  const tolerance =
    check.tolerance === null ? (
      <span className="text-soft">exact</span>
    ) : (
      <Num value={check.tolerance} digits={2} />
    )
  const time = duration(check.milliseconds)
  return (
    <tr id={`check-${check.id}`} className="scroll-mt-24">
      <th scope="row" className="border-b py-1 pr-2 text-left font-normal sm:min-w-56">
        {check.title}
        <span className="my-0.5 grid grid-cols-[max-content_minmax(0,1fr)] gap-x-2 sm:hidden print:hidden">
          <span className="text-soft">fast</span> <Value value={check.fast} />
          <span className="text-soft">independent</span> <Value value={check.independent} />
          <span className="col-span-2 text-xs text-soft">
            {tolerance}, {time}
          </span>
        </span>
        {check.note !== '' && <span className="block text-xs text-soft">{check.note}</span>}
      </th>
      <td className={`${cell} whitespace-nowrap ${look}`}>{word}</td>
      <td className={`${cell} ${wide} text-right`}>
        <Value value={check.fast} />
      </td>
      <td className={`${cell} ${wide} text-right`}>
        <Value value={check.independent} />
      </td>
      <td className={`${cell} ${wide} text-right whitespace-nowrap`}>{tolerance}</td>
      <td className={`${cell} ${wide} text-right whitespace-nowrap tabular-nums`}>{time}</td>
    </tr>
  )
}

/** Both numbers in full, so that a difference in the last digits can be seen. */
function Value({ value }: { value: CertificateCheck['fast'] }) {
  if (value === null) return <span className="text-soft">–</span>
  if (typeof value === 'number') return <Num value={value} digits={12} />
  const hash = /^[0-9a-f]{16,}$/.test(value)
  return (
    <span
      data-raw={value}
      className={hash ? 'inline-block w-36 font-mono text-xs break-all' : 'break-words tabular-nums'}
    >
      {/^-\d/.test(value) ? value.replace('-', '−') : value}
    </span>
  )
}

function duration(milliseconds: number): string {
  if (milliseconds < 1) return '< 1 ms'
  return milliseconds < 10_000
    ? `${formatNumber(Math.round(milliseconds))} ms`
    : `${(milliseconds / 1000).toFixed(1)} s`
}
