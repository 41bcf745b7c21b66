import { useCallback, useState } from 'react'
import { Link, useParams } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { toast } from 'sonner'
import { type TargetDetail } from '../../../shared/targets.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { explain } from '../../api/request.ts'
import { targetQuery, useSaveVersion } from '../../api/targets.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { QueryView } from '../../components/ui/States.tsx'
import { formatTime } from '../../lib/numbers.ts'
import { useRuleReport, whyUnsound } from '../../components/editor/useRuleReport.ts'
import { DraftOffers } from './DraftOffers.tsx'
import { LeaveDialog } from './LeaveDialog.tsx'
import { RenameTarget } from './RenameTarget.tsx'
import { useDraft } from './useDraft.ts'
import { useLeaveGuard } from './useLeaveGuard.ts'
import { VersionList } from './VersionList.tsx'
import { Workbench } from './Workbench.tsx'

export function TargetPage() {
  const { campaignId = '', targetId = '' } = useParams()
  const target = useQuery(targetQuery(campaignId, targetId))
  return (
    <QueryView query={target} what="the target" shape="page">
      {(detail) => <Target key={detail.id} campaign={campaignId} target={detail} />}
    </QueryView>
  )
}

function Target({ campaign, target }: { campaign: string; target: TargetDetail }) {
  const latest = target.versions[0]
  const [text, setText] = useState(latest?.text ?? '')
  const save = useSaveVersion(campaign, target.id)
  const barred = useBarred('targets.edit')
  const barredSearch = useBarred('searches.run')
  const saved = latest?.text ?? ''
  // Somebody else has saved a version: an editor in which nothing was changed follows.
  const [base, setBase] = useState(saved)
  if (saved !== base) {
    setBase(saved)
    if (text === base) setText(saved)
  }
  const changed = text !== saved
  const checked = useRuleReport(text)
  const draft = useDraft(target.id, text, saved, latest?.number ?? null)
  const { setAside } = draft
  const blocker = useLeaveGuard(changed && !barred)
  const put = useCallback(
    (next: string, what: string) => {
      const before = text
      if (before !== saved) setAside(before)
      setText(next)
      toast(what, before === saved ? {} : { action: { label: 'Undo', onClick: () => setText(before) } })
    },
    [text, saved, setAside],
  )
  const take = useCallback(
    ({ text: older, number }: TargetDetail['versions'][number]) =>
      put(older, `The text of version ${number} is in the editor; saving makes it a new version.`),
    [put],
  )
  const saveNow = () =>
    save.mutate(text, {
      onSuccess: (saved) => toast(`Version ${saved.versions[0]?.number ?? ''} is saved.`),
      onError: (error) => toast.error(explain(error)),
    })
  return (
    <>
      <PageHead
        title={target.name}
        above={
          <Link to={`/campaigns/${campaign}/targets`} className="hover:underline">
            Targets
          </Link>
        }
        actions={
          <>
            {!barred && <RenameTarget campaign={campaign} target={target} />}
            <ActionButton
              kind={changed ? 'primary' : 'plain'}
              busy={save.isPending}
              action={{
                ...{ id: 'target.save', section: 'Target', shortcut: 'Mod+s', run: saveNow },
                label: `Save as version ${(latest?.number ?? 0) + 1}`,
                unavailable:
                  barred ||
                  (!changed && 'Nothing has changed since the last version.') ||
                  whyUnsound(checked),
              }}
            />
            <ActionButton
              kind="primary"
              action={{
                ...{ id: 'target.search', label: 'Search with it', section: 'Target' },
                to: `/campaigns/${campaign}/searches/new?target=${target.id}`,
                unavailable:
                  barredSearch || (changed && 'Save this version first; a search runs a saved version.'),
              }}
            />
          </>
        }
      >
        {latest && `Version ${latest.number}, saved ${formatTime(latest.createdAt)} by ${latest.author}`}
        {changed && <span className="text-found"> · changed since</span>}
      </PageHead>
      {!barred && <DraftOffers kept={draft} text={text} onPut={put} />}
      <Workbench
        campaign={campaign}
        target={target}
        text={text}
        onText={setText}
        checked={checked}
        versions={<VersionList campaign={campaign} target={target} text={text} onTake={take} />}
      />
      <LeaveDialog blocker={blocker} onDrop={draft.forget} />
    </>
  )
}
