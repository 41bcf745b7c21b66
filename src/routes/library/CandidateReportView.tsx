import { Link } from 'react-router-dom'
import { type CandidateImportReport } from '../../../shared/importedCandidates.ts'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { VerdictMark } from '../../components/ui/VerdictMark.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'
import { ProblemList } from './ProblemList.tsx'

const shown = 200
const statuses = { imported: 'imported before', found: 'found by a search here' } as const

/** What became of each candidate of a text. */
export function CandidateReportView({
  report,
  campaign,
  onMore,
  onClose,
}: {
  report: CandidateImportReport
  campaign: string
  onMore: () => void
  onClose: () => void
}) {
  const { imported, problems, skipped, format } = report
  const known = imported.filter((row) => row.known !== null).length
  return (
    <div className="flex flex-col gap-4">
      <div role="status">
        <p>
          <strong className="font-medium">{counted(imported.length, 'candidate')} imported</strong>
          {known > 0 && `, ${formatNumber(known)} of them known before`}
          {problems.length > 0 ? `; ${counted(problems.length, 'problem')}.` : '; no problems.'}
        </p>
        <p className="text-xs text-soft">Read as {format}.</p>
      </div>
      <ProblemList problems={problems} />
      {imported.length > 0 && (
        <div className="max-h-64 overflow-y-auto">
          <Table label="Imported candidates">
            <thead>
              <tr>
                <Th numeric>Line</Th>
                <Th>Candidate</Th>
                <Th>Polytope</Th>
                <Th numeric>h11, h21</Th>
                <Th>Status</Th>
                <Th>Verdicts here</Th>
              </tr>
            </thead>
            <tbody>
              {imported.slice(0, shown).map((row, index) => (
                <tr key={index}>
                  <Td numeric>{row.line}</Td>
                  <Td className="max-w-48 truncate">
                    <Link
                      className="text-action hover:underline"
                      to={`/candidates/${row.key}?campaign=${campaign}`}
                    >
                      {row.name}
                    </Link>
                  </Td>
                  <Td className="max-w-48 truncate">
                    <Link className="hover:underline" to={`/library/${row.polytopeKey}?campaign=${campaign}`}>
                      {row.polytopeName}
                    </Link>
                  </Td>
                  <Td numeric>
                    {row.h11}, {row.h21}
                  </Td>
                  <Td>{row.known === null ? 'new' : statuses[row.known]}</Td>
                  <Td>
                    {row.verdicts.map((verdict) => (
                      <span key={verdict.targetId} className="mr-3 inline-flex gap-1">
                        <VerdictMark verdict={verdict} />
                        <span className="text-soft">
                          {verdict.targetName} v{verdict.targetVersion}
                        </span>
                      </span>
                    ))}
                  </Td>
                </tr>
              ))}
            </tbody>
          </Table>
          {imported.length > shown && <p className="py-1 text-xs text-soft">The first {shown} are listed.</p>}
        </div>
      )}
      {skipped.length > 0 && (
        <details>
          <summary className="cursor-pointer text-action">
            {counted(skipped.length, 'line')} passed over as no data
          </summary>
          <ul className="max-h-40 overflow-y-auto font-mono text-xs">
            {skipped.slice(0, shown).map(({ line, text }) => (
              <li key={line} className="truncate py-0.5">
                <span className="text-soft">line {line}</span> {text}
              </li>
            ))}
          </ul>
        </details>
      )}
      <div className="flex flex-wrap gap-2">
        {imported.length > 0 && (
          <ButtonLink
            kind={problems.length > 0 ? 'plain' : 'primary'}
            to={`/campaigns/${campaign}/imported`}
            onClick={onClose}
          >
            To the imported candidates
          </ButtonLink>
        )}
        <Button kind={problems.length > 0 ? 'primary' : 'plain'} onClick={onMore}>
          {problems.length > 0 ? 'Back to the text' : 'Import more'}
        </Button>
      </div>
    </div>
  )
}
