import { useState } from 'react'
import { type CampaignDetail } from '../../../shared/campaigns.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useEditCampaign } from '../../api/campaigns.ts'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { CampaignForm } from '../campaigns/CampaignForm.tsx'

export function EditCampaign({ campaign }: { campaign: CampaignDetail }) {
  const [open, setOpen] = useState(false)
  const edit = useEditCampaign(campaign.id)
  return (
    <>
      <ActionButton
        kind="quiet"
        action={{
          ...{ id: 'campaign.edit', label: 'Edit the campaign', section: 'Campaign' },
          run: () => setOpen(true),
        }}
      >
        Edit
      </ActionButton>
      <Dialog open={open} onOpenChange={setOpen} title="Edit the campaign">
        <CampaignForm
          word="Save"
          busy={edit.isPending}
          error={edit.error}
          initial={campaign}
          onSend={(body) => edit.mutate(body, { onSuccess: () => setOpen(false) })}
        />
      </Dialog>
    </>
  )
}
