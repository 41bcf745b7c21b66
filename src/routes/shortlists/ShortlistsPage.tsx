import { useParams } from 'react-router-dom'
import { useShortlists } from '../../api/shortlists.ts'
import { ButtonLink } from '../../components/ui/Button.tsx'
import { Caution } from '../../components/ui/Caution.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { ShortlistTable } from './ShortlistTable.tsx'

export function ShortlistsPage() {
  const { campaignId = '' } = useParams()
  const shortlists = useShortlists(campaignId)
  return (
    <>
      <PageHead
        title="Shortlists"
        actions={<ButtonLink to={`/campaigns/${campaignId}/imported`}>Imported candidates</ButtonLink>}
      >
        A shortlist is a ranked, frozen list of candidates from searches of one target version, or of imported
        ones, for review.
      </PageHead>
      <QueryView query={shortlists} what="the shortlists">
        {(list) =>
          list.length === 0 ? (
            <Empty title="No shortlist has been made.">
              Open a search that has found candidates, or the imported candidates, and choose “Make a
              shortlist”.
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
