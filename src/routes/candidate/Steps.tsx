import { useNavigate } from 'react-router-dom'
import { ChevronLeft, ChevronRight } from 'lucide-react'
import { type CandidateRecord } from '../../../shared/candidates.ts'
import { Button } from '../../components/ui/Button.tsx'
import { useShortcut } from '../../lib/shortcuts.ts'

/** Previous and next in the shortlist the reader came from. */
export function Steps({
  campaign,
  appearance,
}: {
  campaign: string
  appearance: CandidateRecord['appearances'][number]
}) {
  const navigate = useNavigate()
  const { previousKey, nextKey, rank, size, shortlistId } = appearance
  const go = (key: string | null) => {
    if (key) void navigate(`/candidates/${key}?campaign=${campaign}&shortlist=${shortlistId}`)
  }
  useShortcut({ key: 'k', does: 'Previous in the shortlist', group: 'Dossier' }, () => go(previousKey))
  useShortcut({ key: 'j', does: 'Next in the shortlist', group: 'Dossier' }, () => go(nextKey))
  return (
    <>
      <span className="text-soft">
        rank {rank} of {size}
      </span>
      <Button
        unavailable={previousKey === null && 'This is the first of the list.'}
        onClick={() => go(previousKey)}
      >
        <ChevronLeft size={14} aria-hidden /> Previous
      </Button>
      <Button unavailable={nextKey === null && 'This is the last of the list.'} onClick={() => go(nextKey)}>
        Next <ChevronRight size={14} aria-hidden />
      </Button>
    </>
  )
}
