import { useState } from 'react'
import { type CampaignSummary } from '../../../shared/campaigns.ts'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { Tabs } from '../../components/ui/Tabs.tsx'
import { ImportCandidatesForm } from './ImportCandidatesForm.tsx'
import { ImportPolytopesForm } from './ImportPolytopesForm.tsx'
import { ImportWeightsForm } from './ImportWeightsForm.tsx'

export type ImportKind = 'polytopes' | 'candidates' | 'weights'

interface ImportDialogProps {
  campaign: CampaignSummary
  open: boolean
  onOpenChange: (open: boolean) => void
  /** What is offered first. */
  kind?: ImportKind
}

/** Polytopes, candidates or weight systems from a text or a file, and what became of each. */
export function ImportDialog({ campaign, open, onOpenChange, kind = 'polytopes' }: ImportDialogProps) {
  return (
    <Dialog
      wide
      open={open}
      onOpenChange={onOpenChange}
      title="Import"
      description={`Into “${campaign.name}”; its members alone see what is imported.`}
    >
      <ImportTabs campaign={campaign.id} kind={kind} onClose={() => onOpenChange(false)} />
    </Dialog>
  )
}

/** Inside the dialog's content, so that each opening begins afresh. */
function ImportTabs({
  campaign,
  kind,
  onClose,
}: {
  campaign: string
  kind: ImportKind
  onClose: () => void
}) {
  const [what, setWhat] = useState<string>(kind)
  const props = { campaign, onClose }
  return (
    <Tabs
      label="What to import"
      value={what}
      onChange={setWhat}
      items={[
        { value: 'polytopes', label: 'Polytopes', content: <ImportPolytopesForm {...props} /> },
        { value: 'candidates', label: 'Candidates', content: <ImportCandidatesForm {...props} /> },
        { value: 'weights', label: 'Weight systems', content: <ImportWeightsForm {...props} /> },
      ]}
    />
  )
}
