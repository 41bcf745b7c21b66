import { Link, useParams } from 'react-router-dom'
import { type CampaignDetail } from '../../../shared/campaigns.ts'
import { may } from '../../../shared/roles.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useCampaignActions } from '../../actions/useCampaignActions.ts'
import { useCampaign } from '../../api/campaigns.ts'
import { useSession } from '../../api/session.ts'
import { Caution } from '../../components/ui/Caution.tsx'
import { PageHead, Section } from '../../components/ui/Layout.tsx'
import { Empty, QueryView } from '../../components/ui/States.tsx'
import { SearchTable } from '../searches/SearchTable.tsx'
import { ShortlistTable } from '../shortlists/ShortlistTable.tsx'
import { TargetTable } from '../targets/TargetTable.tsx'
import { EditCampaign } from './EditCampaign.tsx'
import { FirstSteps } from './FirstSteps.tsx'
import { Mentions } from './Mentions.tsx'
import { Members } from './Members.tsx'

export function CampaignPage() {
  const { campaignId = '' } = useParams()
  const campaign = useCampaign(campaignId)
  return (
    <QueryView query={campaign} what="the campaign" shape="page">
      {(detail) => <Campaign campaign={detail} />}
    </QueryView>
  )
}

function Campaign({ campaign }: { campaign: CampaignDetail }) {
  const base = `/campaigns/${campaign.id}`
  const { newTarget, newSearch } = useCampaignActions()
  const active = campaign.searchList.filter(({ state }) => /^(running|queued|paused|failed)$/.test(state))
  const running = campaign.searchList.filter(({ state }) => state === 'running' || state === 'queued').length
  // A list with a newer issue is reviewed there.
  const issuedAnew = new Set(campaign.shortlistList.map(({ reissueOfId }) => reissueOfId))
  const open = campaign.shortlistList.filter(({ id, undecided }) => undecided > 0 && !issuedAnew.has(id))
  const me = useSession().data?.account?.id
  const yours = open
    .flatMap(({ waiting }) => waiting.filter(({ id }) => id === me))
    .reduce((sum, { open }) => sum + open, 0)
  const finished = campaign.searchList.filter(({ state }) => state === 'finished').slice(0, 5)
  return (
    <>
      <PageHead
        title={campaign.name}
        actions={
          <>
            {may(campaign.role, 'campaign.edit') && <EditCampaign campaign={campaign} />}
            {may(campaign.role, 'targets.edit') && <ActionButton action={newTarget} />}
            {may(campaign.role, 'searches.run') && <ActionButton kind="primary" action={newSearch} />}
          </>
        }
      >
        {campaign.description}
      </PageHead>

      <FirstSteps campaign={campaign} />
      <Mentions campaign={campaign.id} />
      <Section
        margin
        title="To review"
        note={
          open.length > 0
            ? `${open.reduce((sum, { undecided }) => sum + undecided, 0)} candidates wait for a verdict${yours > 0 ? `, ${yours} of them assigned to you` : ''}.`
            : undefined
        }
      >
        {open.length > 0 ? (
          <ShortlistTable campaign={campaign.id} list={open} label="Shortlists with undecided candidates" />
        ) : (
          <Empty title="No candidate waits for a verdict.">
            {campaign.shortlistList.length > 0 ? (
              <Link className="text-action underline" to={`${base}/shortlists`}>
                All shortlists
              </Link>
            ) : (
              <>
                Shortlists are made on the page of a search that has found candidates, or of{' '}
                <Link className="text-action underline" to={`${base}/imported`}>
                  imported candidates
                </Link>
                .
              </>
            )}
          </Empty>
        )}
      </Section>

      <Section margin title="Searches under way" note={running > 0 ? `${running} running now.` : undefined}>
        {active.length > 0 ? (
          <SearchTable campaign={campaign.id} list={active} label="Searches under way" />
        ) : (
          <Empty title="No search is running, paused or failed." />
        )}
      </Section>

      {finished.length > 0 && (
        <Section margin title="Finished lately">
          <SearchTable campaign={campaign.id} list={finished} label="Searches finished lately" />
        </Section>
      )}

      <Section margin title="Targets">
        {campaign.targetList.length > 0 ? (
          <TargetTable campaign={campaign.id} list={campaign.targetList} />
        ) : (
          <Empty title="No target has been written.">
            {may(campaign.role, 'targets.edit')
              ? 'Start with “New target”: a few lines that say what a good candidate is.'
              : 'A lead or an investigator writes the first one.'}
          </Empty>
        )}
      </Section>

      <Section margin title="Members" note={`Your role: ${campaign.role}.`}>
        <Members campaign={campaign} />
      </Section>
      <Caution />
    </>
  )
}
