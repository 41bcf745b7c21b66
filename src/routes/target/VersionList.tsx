import { useState } from 'react'
import { type TargetDetail } from '../../../shared/targets.ts'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { formatTime } from '../../lib/numbers.ts'
import { lineDifferences } from './lineDifferences.ts'

/** Saved versions, newest first; one can be compared with the text in the editor, taken over, or searched with. */
export function VersionList({
  campaign,
  target,
  text,
  onTake,
}: {
  campaign: string
  target: TargetDetail
  text: string
  onTake: (text: string) => void
}) {
  const [compared, setCompared] = useState<string | null>(null)
  return (
    <ol aria-label="Versions, newest first">
      {target.versions.map((version) => (
        <li key={version.id} className="border-b py-2 first:pt-0">
          <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
            <strong className="font-medium">Version {version.number}</strong>
            <span>{version.author}</span>
            <span className="text-soft">{formatTime(version.createdAt)}</span>
            <span className="text-soft">
              {version.searches === 1 ? '1 search' : `${version.searches} searches`}
            </span>
            <span className="ml-auto flex flex-wrap gap-1">
              <Button
                kind="quiet"
                aria-expanded={compared === version.id}
                onClick={() => setCompared(compared === version.id ? null : version.id)}
              >
                Compare
              </Button>
              <Button
                kind="quiet"
                unavailable={version.text === text && 'The editor holds this text already.'}
                onClick={() => onTake(version.text)}
              >
                Take over
              </Button>
              <ButtonLink
                kind="quiet"
                to={`/campaigns/${campaign}/searches/new?target=${target.id}&version=${version.id}`}
              >
                Search with it
              </ButtonLink>
            </span>
          </div>
          {compared === version.id && <Differences before={version.text} after={text} />}
        </li>
      ))}
    </ol>
  )
}

const marks = { same: ' ', removed: '−', added: '+' } as const
const names = { same: '', removed: 'only in the version: ', added: 'only in the editor: ' } as const
const colours = { same: 'text-soft', removed: 'bg-rejected-wash', added: 'bg-action-wash' } as const

function Differences({ before, after }: { before: string; after: string }) {
  if (before === after) return <p className="mt-1 text-soft">No difference from the text in the editor.</p>
  return (
    <pre className="mt-2 overflow-x-auto font-mono text-xs leading-5">
      {lineDifferences(before, after).map((line, index) => (
        <div key={index} className={colours[line.kind]}>
          <span aria-hidden className="inline-block w-4">
            {marks[line.kind]}
          </span>
          <span className="sr-only">{names[line.kind]}</span>
          {line.text}
        </div>
      ))}
    </pre>
  )
}
