import { useMemo } from 'react'
import { type ShortlistDetail } from '../../../shared/shortlists.ts'
import { certificateWord } from '../../components/ui/CertificateMark.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'
import { ConditionFields } from './ColumnConditions.tsx'
import { type ListColumn } from './listColumns.ts'
import { certificateStates, isForOther, type ShortlistView } from './shortlistView.ts'

type Option = readonly [value: string, label: string]

/** Counts beside the choices: of the whole list, whatever is shown of it. */
function useChoices(list: ShortlistDetail, me: string | null) {
  return useMemo(() => {
    const certificates = new Map<string, number>()
    const reviewers = new Map<string, { name: string; count: number }>()
    let [others, unassigned] = [0, 0]
    for (const row of list.rows) {
      const { state } = row.certificate
      certificates.set(state, (certificates.get(state) ?? 0) + 1)
      if (isForOther(row, list)) others += 1
      if (row.assignee === null) unassigned += 1
      else {
        const { id, name } = row.assignee
        reviewers.set(id, { name, count: (reviewers.get(id)?.count ?? 0) + 1 })
      }
    }
    const mine = (me !== null && reviewers.get(me)?.count) || 0
    const people: Option[] = [...reviewers]
      .filter(([id]) => id !== me)
      .map(([id, { name, count }]) => [id, `${name} (${count})`] as const)
      .sort(([, a], [, b]) => a.localeCompare(b))
    return { certificates, others, unassigned, mine, people }
  }, [list, me])
}

export function ListFilters({
  view,
  list,
  columns,
  me,
  onChange,
}: {
  view: ShortlistView
  list: ShortlistDetail
  columns: readonly ListColumn[]
  me: string | null
  onChange: (changes: Record<string, string>) => void
}) {
  const { certificates, others, unassigned, mine, people } = useChoices(list, me)
  const { size, undecided, verified, rejected, oneReader } = list
  const choose = (part: string) => (event: { target: { value: string } }) =>
    onChange({ [part]: event.target.value === 'all' ? '' : event.target.value })
  return (
    <form
      role="search"
      aria-label="Filter the shortlist"
      className="flex flex-wrap items-end gap-3"
      onSubmit={(event) => event.preventDefault()}
    >
      <Select
        label="Verdict"
        value={view.verdict}
        onChange={choose('verdict')}
        options={[
          ['all', `all (${size})`],
          ['undecided', `undecided (${undecided})`],
          ...(oneReader > 0 || view.verdict === 'one-reader'
            ? [['one-reader', `verified by one reader (${oneReader})`] as const]
            : []),
          ['verified', `verified (${verified})`],
          ['rejected', `rejected (${rejected})`],
          ...(others > 0 || view.verdict === 'other-version'
            ? [['other-version', `given for another version (${others})`] as const]
            : []),
        ]}
      />
      {(people.length > 0 || mine > 0 || view.reviewer !== 'all') && (
        <Select
          label="Assigned to"
          value={view.reviewer}
          onChange={choose('reviewer')}
          options={[
            ['all', `anybody (${size})`],
            ['me', `me (${mine})`],
            ['none', `nobody (${unassigned})`],
            ...people,
            ...(['all', 'me', 'none'].includes(view.reviewer) || people.some(([id]) => id === view.reviewer)
              ? []
              : [[view.reviewer, 'somebody with no row here (0)'] as const]),
          ]}
        />
      )}
      <Select
        label="Certificate"
        value={view.certificate}
        onChange={choose('certificate')}
        options={[
          ['all', `all (${size})`],
          ...certificateStates.map(
            (state) => [state, `${certificateWord(state)} (${certificates.get(state) ?? 0})`] as const,
          ),
        ]}
      />
      <TextField
        label="Polytope or key"
        value={view.text}
        onChange={(event) => onChange({ text: event.target.value })}
      />
      <ConditionFields columns={columns} conditions={view.conditions} onChange={onChange} />
      <label className="flex min-h-8 items-center gap-2">
        <input
          type="checkbox"
          checked={view.hits}
          onChange={(event) => onChange({ hits: event.target.checked ? 'yes' : '' })}
        />
        hits only
      </label>
    </form>
  )
}
