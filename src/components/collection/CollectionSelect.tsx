import { type CollectionView } from '../../../shared/collections.ts'
import { useCollections } from '../../api/collections.ts'
import { counted } from '../../lib/numbers.ts'
import { Field } from '../ui/Field.tsx'

/** One of the campaign's collections, or of those that others published. */
export function CollectionSelect({
  label,
  none,
  campaign,
  value,
  onChange,
  className,
}: {
  label: string
  /** Words of the choice of no collection. */
  none: string
  campaign?: string
  value: string
  onChange: (collection: CollectionView | undefined) => void
  className?: string
}) {
  const collections = useCollections(campaign)
  const list = collections.data ?? []
  const groups = [
    ['Of this campaign', list.filter(({ own }) => own)],
    ['Published by others', list.filter(({ own }) => !own)],
  ] as const
  return (
    <Field label={label} className={className}>
      {(field) => (
        <select
          {...field}
          value={value}
          onChange={(event) => onChange(list.find(({ id }) => id === event.target.value))}
        >
          <option value="">{none}</option>
          {value !== '' && collections.data && !list.some(({ id }) => id === value) && (
            <option value={value}>not available</option>
          )}
          {groups.map(
            ([heading, members]) =>
              members.length > 0 && (
                <optgroup key={heading} label={heading}>
                  {members.map(({ id, name, polytopes }) => (
                    <option key={id} value={id}>
                      {name} ({counted(polytopes, 'polytope')})
                    </option>
                  ))}
                </optgroup>
              ),
          )}
        </select>
      )}
    </Field>
  )
}
