import { useState } from 'react'
import { CandidateChoice } from '../../components/candidate/CandidateChoice.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { useShortcut } from '../../lib/shortcuts.ts'
import { compareCandidatesAddress } from '../candidates/compare/compareAddress.ts'

/** Opens a dialog to choose another candidate, and lays the two side by side. */
export function CompareWith({
  campaign,
  candidate,
  shortlist,
}: {
  campaign: string | null
  candidate: string
  shortlist?: string
}) {
  const [open, setOpen] = useState(false)
  useShortcut({ key: 'c', does: 'Compare with another candidate', group: 'Dossier' }, () => setOpen(true))
  return (
    <>
      <Button onClick={() => setOpen(true)}>Compare with…</Button>
      <Dialog
        open={open}
        onOpenChange={setOpen}
        title="Compare with"
        description="Another candidate, side by side: on the same polytope triangle by triangle, on another by facts and spectra."
        wide
      >
        <CandidateChoice
          campaign={campaign}
          candidate={candidate}
          shortlist={shortlist}
          addressOf={(other) => compareCandidatesAddress([candidate, other], campaign)}
        />
      </Dialog>
    </>
  )
}
