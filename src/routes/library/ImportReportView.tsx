import { Link } from 'react-router-dom'
import { type ImportReport } from '../../../shared/polytopes.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { ProblemList } from './ProblemList.tsx'

const shown = 200

/** What became of each block: the good ones with their Hodge numbers, the bad ones with line and reason. */
export function ImportReportView({
  report,
  campaign,
  onMore,
  onClose,
}: {
  report: ImportReport
  campaign: string
  onMore: () => void
  onClose: () => void
}) {
  const { imported, problems } = report
  const known = imported.filter((row) => row.known).length
  return (
    <div className="flex flex-col gap-4">
      <p role="status">
        <strong className="font-medium">{counted(imported.length, 'polytope')} imported</strong>
        {known > 0 && `, ${formatNumber(known)} of them known before`}
        {problems.length > 0 ? `; ${counted(problems.length, 'problem')}.` : '; no problems.'}
      </p>
      <ProblemList problems={problems} />
      {imported.length > 0 && (
        <div className="max-h-64 overflow-y-auto">
          <Table label="Imported polytopes">
            <thead>
              <tr>
                <Th numeric>Line</Th>
                <Th>Name</Th>
                <Th numeric>h11</Th>
                <Th numeric>h21</Th>
                <Th>Known before</Th>
              </tr>
            </thead>
            <tbody>
              {imported.slice(0, shown).map((row, index) => (
                <tr key={index}>
                  <Td numeric>{row.line ?? '–'}</Td>
                  <Td>
                    <Link
                      className="text-action hover:underline"
                      to={`/library/${row.key}?campaign=${campaign}`}
                    >
                      {row.name}
                    </Link>
                  </Td>
                  <Td numeric>{row.h11}</Td>
                  <Td numeric>{row.h21}</Td>
                  <Td>{row.known ? 'yes' : 'no'}</Td>
                </tr>
              ))}
            </tbody>
          </Table>
          {imported.length > shown && <p className="py-1 text-xs text-soft">The first {shown} are listed.</p>}
        </div>
      )}
      <div className="flex gap-2">
        <Button kind="primary" onClick={onClose}>
          To the library
        </Button>
        <Button onClick={onMore}>{problems.length > 0 ? 'Back to the text' : 'Import more'}</Button>
      </div>
    </div>
  )
}
