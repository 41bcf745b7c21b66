import { useQuery } from '@tanstack/react-query'
import { targetQuery, useTargets } from '../../api/targets.ts'
import { Select } from '../ui/Field.tsx'

/** A version of a target: all of one target, and the latest of every other. */
export function VersionSelect({
  campaign,
  targetId,
  label,
  hint,
  value,
  first,
  onChange,
}: {
  campaign: string
  /** The target whose older versions are offered, too. */
  targetId: string
  label: string
  hint?: string
  value: string
  /** An option that stands for no version. */
  first?: string
  onChange: (versionId: string) => void
}) {
  const targets = useTargets(campaign)
  const { data: own } = useQuery({ ...targetQuery(campaign, targetId), enabled: targetId !== '' })
  const options = [
    ...(first === undefined ? [] : [['', first] as const]),
    ...(own?.versions ?? []).map(({ id, number }) => [id, `${own?.name}, version ${number}`] as const),
    ...(targets.data ?? [])
      .filter(({ id }) => id !== targetId)
      .map(({ name, latest }) => [latest.id, `${name}, version ${latest.number}`] as const),
  ]
  return (
    <Select
      label={label}
      hint={hint}
      value={value}
      onChange={(event) => onChange(event.target.value)}
      options={options}
    />
  )
}
