import { useParams } from 'react-router-dom'
import { Plus } from 'lucide-react'
import { useShortlists } from '../../api/shortlists.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { RescoringProgress } from '../../components/shortlist/RescoringProgress.tsx'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { ShortlistTable } from './ShortlistTable.tsx'

export function ShortlistsPage() {
  const { campaignId = '' } = useParams()
  const shortlists = useShortlists(campaignId)
  const barred = useBarred('shortlists.edit')
  return (
    <>
      <PageHead
        title="Shortlists"
        actions={
          <>
            <ButtonLink to={`/campaigns/${campaignId}/imported`}>Imported candidates</ButtonLink>
            {barred ? (
              <Button unavailable={barred}>New shortlist</Button>
            ) : (
              <ButtonLink kind="primary" to={`/campaigns/${campaignId}/shortlists/new`}>
                <Plus size={16} aria-hidden />
                New shortlist
              </ButtonLink>
            )}
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
