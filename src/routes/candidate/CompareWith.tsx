import { useState } from 'react'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { CandidateChoice } from '../../components/candidate/CandidateChoice.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
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
  return (
    <>
      <ActionButton
        action={{
          ...{ id: 'dossier.compare', label: 'Compare with another candidate', section: 'Dossier' },
          shortcut: 'c',
          run: () => setOpen(true),
        }}
      >
        Compare with…
      </ActionButton>
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
