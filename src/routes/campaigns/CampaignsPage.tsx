import { useState } from 'react'
import { Link, useNavigate } from 'react-router-dom'
import { Plus } from 'lucide-react'
import { type CampaignSummary } from '../../../shared/campaigns.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useCampaigns, useCreateCampaign } from '../../api/campaigns.ts'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'
import { formatNumber } from '../../lib/numbers.ts'
import { CampaignForm } from './CampaignForm.tsx'

export function CampaignsPage() {
  const campaigns = useCampaigns()
  const [creating, setCreating] = useState(false)
  return (
    <>
      <PageHead
        title="Campaigns"
        actions={
          <ActionButton
            kind="primary"
            action={{
              ...{ id: 'campaign.new', label: 'New campaign', section: 'Campaigns' },
              run: () => setCreating(true),
            }}
          >
            <Plus size={16} aria-hidden />
            New campaign
          </ActionButton>
        }
      >
        A campaign is one team’s hunt: its members, targets, searches and shortlists.
      </PageHead>
      <QueryView query={campaigns} what="your campaigns">
        {(list) =>
          list.length === 0 ? (
            <Empty title="You are in no campaign yet.">
              Start one with “New campaign”, or ask the lead of an existing campaign to add your e-mail
              address.
            </Empty>
          ) : (
            <CampaignTable list={list} />
          )
        }
      </QueryView>
      <NewCampaignDialog open={creating} onOpenChange={setCreating} />
    </>
  )
}

function CampaignTable({ list }: { list: CampaignSummary[] }) {
  return (
    <Table label="Campaigns">
      <thead>
        <tr>
          <Th>Campaign</Th>
          <Th>Your role</Th>
          <Th numeric>Targets</Th>
          <Th numeric>Searches</Th>
          <Th numeric>Running</Th>
          <Th numeric>Shortlists</Th>
          <Th numeric>Undecided</Th>
        </tr>
      </thead>
      <tbody>
        {list.map((campaign) => (
          <tr key={campaign.id} className="hover:bg-action-wash">
            <Td className="max-w-[36rem] truncate">
              <Link to={`/campaigns/${campaign.id}`} className="font-medium text-action hover:underline">
                {campaign.name}
              </Link>
              {campaign.description && <span className="ml-3 text-soft">{campaign.description}</span>}
            </Td>
            <Td>{campaign.role}</Td>
            <Td numeric>{formatNumber(campaign.targets)}</Td>
            <Td numeric>{formatNumber(campaign.searches)}</Td>
            <Td numeric>{formatNumber(campaign.runningSearches)}</Td>
            <Td numeric>{formatNumber(campaign.shortlists)}</Td>
            <Td numeric>{formatNumber(campaign.undecided)}</Td>
          </tr>
        ))}
      </tbody>
    </Table>
  )
}

function NewCampaignDialog({ open, onOpenChange }: { open: boolean; onOpenChange: (open: boolean) => void }) {
  const navigate = useNavigate()
  const create = useCreateCampaign()
  return (
    <Dialog open={open} onOpenChange={onOpenChange} title="New campaign" description="You become its lead.">
      <CampaignForm
        word="Create the campaign"
        busy={create.isPending}
        error={create.error}
        onSend={(body) =>
          create.mutate(body, { onSuccess: (campaign) => void navigate(`/campaigns/${campaign.id}`) })
        }
      />
    </Dialog>
  )
}
