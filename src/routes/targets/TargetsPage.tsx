import { useParams } from 'react-router-dom'
import { Plus } from 'lucide-react'
import { useTargets } from '../../api/targets.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { TargetTable } from './TargetTable.tsx'

export function TargetsPage() {
  const { campaignId = '' } = useParams()
  const targets = useTargets(campaignId)
  const barred = useBarred('targets.edit')
  return (
    <>
      <PageHead
        title="Targets"
        actions={
          <>
            <ButtonLink to="/reference">Observables</ButtonLink>
            {barred ? (
              <Button unavailable={barred}>New target</Button>
            ) : (
              <ButtonLink kind="primary" to={`/campaigns/${campaignId}/targets/new`}>
                <Plus size={16} aria-hidden />
                New target
              </ButtonLink>
            )}
          </>
        }
      >
        A target is a scoring rule with versions: it says what a good candidate is.
      </PageHead>
      <QueryView query={targets} what="the targets">
        {(list) =>
          list.length === 0 ? (
            <Empty title="No target has been written.">
              Start with “New target”; the observables it may use are listed under “Observables”.
            </Empty>
          ) : (
            <TargetTable campaign={campaignId} list={list} />
          )
        }
      </QueryView>
    </>
  )
}
