import { useParams } from 'react-router-dom'
import { Plus } from 'lucide-react'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useCampaignActions } from '../../actions/useCampaignActions.ts'
import { useTargets } from '../../api/targets.ts'
import { PageHead } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { TargetTable } from './TargetTable.tsx'

export function TargetsPage() {
  const { campaignId = '' } = useParams()
  const targets = useTargets(campaignId)
  const { newTarget, reference } = useCampaignActions()
  return (
    <>
      <PageHead
        title="Targets"
        actions={
          <>
            <ActionButton action={reference} />
            <ActionButton kind="primary" action={newTarget}>
              <Plus size={16} aria-hidden />
              {newTarget.label}
            </ActionButton>
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
