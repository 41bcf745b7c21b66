import { ChevronLeft, ChevronRight } from 'lucide-react'
import { type CandidateRecord } from '../../../shared/candidates.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { type Action } from '../../actions/registry.ts'

/** Previous and next in the shortlist the reader came from. */
export function Steps({
  campaign,
  appearance,
}: {
  campaign: string
  appearance: CandidateRecord['appearances'][number]
}) {
  const { previousKey, nextKey, rank, size, shortlistId } = appearance
  const step = (id: string, shortcut: string, label: string, key: string | null, end: string): Action => ({
    ...{ id: `dossier.${id}`, label, section: 'Dossier', shortcut },
    to: `/candidates/${key ?? ''}?campaign=${campaign}&shortlist=${shortlistId}`,
    unavailable: key === null && end,
  })
  return (
    <>
      <span className="text-soft">
        rank {rank} of {size}
      </span>
      <ActionButton
        action={step(
          'previous',
          'k',
          'Previous in the shortlist',
          previousKey,
          'This is the first of the list.',
        )}
      >
        <ChevronLeft size={14} aria-hidden /> Previous
      </ActionButton>
      <ActionButton
        action={step('next', 'j', 'Next in the shortlist', nextKey, 'This is the last of the list.')}
      >
        Next <ChevronRight size={14} aria-hidden />
      </ActionButton>
    </>
  )
}
