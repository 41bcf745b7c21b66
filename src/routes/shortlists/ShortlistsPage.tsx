import { useParams } from 'react-router-dom'
import { Plus } from 'lucide-react'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useCampaignActions } from '../../actions/useCampaignActions.ts'
import { useShortlists } from '../../api/shortlists.ts'
import { RescoringProgress } from '../../components/shortlist/RescoringProgress.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { ShortlistTable } from './ShortlistTable.tsx'

export function ShortlistsPage() {
  const { campaignId = '' } = useParams()
  const shortlists = useShortlists(campaignId)
  const { newShortlist, imported } = useCampaignActions()
  return (
    <>
      <PageHead
        title="Shortlists"
        actions={
          <>
            <ActionButton action={imported} />
            <ActionButton kind="primary" action={newShortlist}>
              <Plus size={16} aria-hidden />
              {newShortlist.label}
            </ActionButton>
          </>
        }
      >
        A shortlist is a ranked, frozen list of candidates for review: from searches, from imports, or another
        list scored anew.
      </PageHead>
      <RescoringProgress campaign={campaignId} />
      <QueryView query={shortlists} what="the shortlists">
        {(list) =>
          list.length === 0 ? (
            <Empty title="No shortlist has been made.">
              Choose “New shortlist” to draw one from what searches have found, or “Make a shortlist” among
              the imported candidates.
            </Empty>
          ) : (
            <>
              <ShortlistTable campaign={campaignId} list={list} label="Shortlists" />
              <Caution className="mt-4" />
            </>
          )
        }
      </QueryView>
    </>
  )
}
