import { memo, useState } from 'react'
import { Link } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { type TargetDetail, type TargetUses } from '../../../shared/targets.ts'
import { targetUsesQuery } from '../../api/targets.ts'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { Select } from '../../components/ui/Field.tsx'
import { SearchStateMark } from '../../components/ui/SearchStateMark.tsx'
import { counted, formatTime } from '../../lib/numbers.ts'
import { Differences } from './Differences.tsx'

interface VersionListProps {
  campaign: string
  target: TargetDetail
  /** In the editor. */
  text: string
  /** Puts a version's text into the editor. */
  onTake: (version: TargetDetail['versions'][number]) => void
}

const inEditor = 'editor'

/** Saved versions, newest first: any two compared, what each was used for, and each as the start of a new draft. */
export const VersionList = memo(function VersionList({ campaign, target, text, onTake }: VersionListProps) {
  const { versions } = target
  const uses = useQuery(targetUsesQuery(campaign, target.id))
  const [compared, setCompared] = useState<readonly [string, string] | null>(null)
  const show = (id: string) => setCompared([id, inEditor])
  return (
    <div>
      <Comparison versions={versions} text={text} compared={compared} onCompared={setCompared} />
      <ol aria-label="Versions, newest first">
        {versions.map((version) => (
          <li key={version.id} className="border-b py-2">
            <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
              <strong className="font-medium">Version {version.number}</strong>
              <span>{version.author}</span>
              <span className="text-soft">{formatTime(version.createdAt)}</span>
              <span className="ml-auto flex flex-wrap gap-1">
                <Button
                  kind="quiet"
                  aria-label={`Compare version ${version.number} with the editor`}
                  onClick={() => show(version.id)}
                >
                  Compare
                </Button>
                <Button
                  kind="quiet"
                  aria-label={`Edit from version ${version.number}`}
                  unavailable={version.text === text && 'The editor holds this text already.'}
                  onClick={() => onTake(version)}
                >
                  Edit from here
                </Button>
                <ButtonLink
                  kind="quiet"
                  aria-label={`Search with version ${version.number}`}
                  to={`/campaigns/${campaign}/searches/new?target=${target.id}&version=${version.id}`}
                >
                  Search with it
                </ButtonLink>
              </span>
            </div>
            <Uses campaign={campaign} uses={uses.data?.find(({ versionId }) => versionId === version.id)} />
          </li>
        ))}
      </ol>
    </div>
  )
})

/** Links shown of each kind before the rest is asked for. */
const firstUses = 4

function Uses({ campaign, uses }: { campaign: string; uses: TargetUses[number] | undefined }) {
  const [all, setAll] = useState(false)
  if (!uses) return null
  const { searches, shortlists } = uses
  const shown = <Row,>(rows: readonly Row[]) => (all ? rows : rows.slice(0, firstUses))
  const more = searches.length + shortlists.length - shown(searches).length - shown(shortlists).length
  return (
    <dl className="mt-1 grid grid-cols-[max-content_minmax(0,1fr)] gap-x-3 gap-y-0.5">
      {searches.length > 0 && (
        <>
          <dt className="text-soft">{counted(searches.length, 'search', 'searches')}</dt>
          <dd className="flex flex-wrap gap-x-4">
            {shown(searches).map(({ id, name, state }) => (
              <span key={id} className="inline-flex items-center gap-2">
                <Link to={`/campaigns/${campaign}/searches/${id}`} className="text-action hover:underline">
                  {name}
                </Link>
                <SearchStateMark state={state} />
              </span>
            ))}
          </dd>
        </>
      )}
      {shortlists.length > 0 && (
        <>
          <dt className="text-soft">{counted(shortlists.length, 'shortlist')}</dt>
          <dd className="flex flex-wrap gap-x-4">
            {shown(shortlists).map(({ id, name }) => (
              <Link
                key={id}
                to={`/campaigns/${campaign}/shortlists/${id}`}
                className="text-action hover:underline"
              >
                {name}
              </Link>
            ))}
          </dd>
        </>
      )}
      {more > 0 && (
        <dd className="col-span-2">
          <Button kind="quiet" onClick={() => setAll(true)}>
            Show {more} more
          </Button>
        </dd>
      )}
    </dl>
  )
}

/** Two texts of the target against each other. */
function Comparison({
  versions,
  text,
  compared,
  onCompared,
}: {
  versions: TargetDetail['versions']
  text: string
  compared: readonly [string, string] | null
  onCompared: (compared: readonly [string, string] | null) => void
}) {
  const [look, setLook] = useState('inline')
  if (!compared) return null
  const options = [
    [inEditor, 'The editor'] as const,
    ...versions.map(({ id, number }) => [id, `Version ${number}`] as const),
  ]
  const textOf = (id: string) => versions.find((version) => version.id === id)?.text ?? text
  const nameOf = (id: string) => options.find(([value]) => value === id)?.[1] ?? ''
  const [before, after] = compared
  return (
    <section aria-label="Comparison" className="mb-2 border-b pb-4">
      <div className="flex flex-wrap items-end gap-x-3 gap-y-2">
        <Select
          label="From"
          value={before}
          onChange={(event) => onCompared([event.target.value, after])}
          options={options}
        />
        <Select
          label="To"
          value={after}
          onChange={(event) => onCompared([before, event.target.value])}
          options={options}
        />
        <Select
          label="Laid out"
          value={look}
          onChange={(event) => setLook(event.target.value)}
          options={[
            ['inline', 'Line under line'],
            ['beside', 'Side by side'],
          ]}
        />
        <Button kind="quiet" onClick={() => onCompared(null)}>
          Close
        </Button>
      </div>
      <Differences
        before={textOf(before)}
        after={textOf(after)}
        names={[nameOf(before), nameOf(after)]}
        sideBySide={look === 'beside'}
      />
    </section>
  )
}
