import { useState } from 'react'
import { Link, useNavigate } from 'react-router-dom'
import { Download } from 'lucide-react'
import { toast } from 'sonner'
import { type ShortlistDetail } from '../../../shared/shortlists.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { exportUrl } from '../../api/shortlists.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { RescoringProgress } from '../../components/shortlist/RescoringProgress.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { formatNumber } from '../../lib/numbers.ts'
import { ExternalDialog } from './ExternalDialog.tsx'
import { ReissueDialog } from './ReissueDialog.tsx'
import { RescoreDialog } from './RescoreDialog.tsx'

interface ListProps {
  campaign: string
  shortlist: ShortlistDetail
}

/** What the list is, and what can be made of it. */
export function ListHead({ campaign, shortlist }: ListProps) {
  const { targetId, targetName, targetVersion, searches, size } = shortlist
  const link = (path: string, words: string) => (
    <Link to={`/campaigns/${campaign}/${path}`} className="text-action hover:underline">
      {words}
    </Link>
  )
  return (
    <PageHead
      title={shortlist.name}
      above={
        <Link to={`/campaigns/${campaign}/shortlists`} className="hover:underline">
          Shortlists
        </Link>
      }
      actions={
        <>
          <ListActions campaign={campaign} shortlist={shortlist} />
          <ExportLink campaign={campaign} shortlist={shortlist} format="csv" />
          <ExportLink campaign={campaign} shortlist={shortlist} format="json" />
        </>
      }
    >
      {link(`targets/${targetId}`, targetName)}, version {targetVersion}; {formatNumber(size)} candidates{' '}
      {searches.length === 0 ? link('imported', 'imported') : 'from '}
      {searches.map(({ id, name }, index) => (
        <span key={id}>
          {index > 0 && ', '}
          {link(`searches/${id}`, name)}
        </span>
      ))}
      .
    </PageHead>
  )
}

type Dialogs = 'rescore' | 'external' | 'reissue'

function ListActions({ campaign, shortlist }: ListProps) {
  const barred = useBarred('shortlists.edit')
  const [open, setOpen] = useState<Dialogs | null>(null)
  const dialog = (name: Dialogs) => ({
    ...{ campaign, open: open === name },
    onOpenChange: (on: boolean) => setOpen(on ? name : null),
  })
  const action = (id: Dialogs, label: string, unavailable: string | false) => (
    <ActionButton
      action={{
        ...{ id: `shortlist.${id}`, label, section: 'Shortlist', unavailable },
        run: () => setOpen(id),
      }}
    />
  )
  return (
    <>
      {action('reissue', 'New issue', barred)}
      {action('rescore', 'Score anew', barred)}
      {action('external', 'External columns', false)}
      <ReissueDialog {...dialog('reissue')} shortlist={shortlist} />
      <RescoreDialog {...dialog('rescore')} shortlist={shortlist} />
      <ExternalDialog {...dialog('external')} shortlist={shortlist.id} />
    </>
  )
}

function ExportLink({ campaign, shortlist, format }: ListProps & { format: 'csv' | 'json' }) {
  const barred = useBarred('exports.read')
  const label = `Export ${format.toUpperCase()}`
  return (
    <ActionButton
      action={{
        ...{ id: `shortlist.${format}`, label, section: 'Shortlist', unavailable: barred },
        file: exportUrl(campaign, shortlist.id, format),
      }}
    >
      <Download size={14} aria-hidden />
      {label}
    </ActionButton>
  )
}

/** Scorings under way that will make a list of this one; the list that comes of one is offered. */
export function Rescorings({ campaign, shortlist }: { campaign: string; shortlist: string }) {
  const navigate = useNavigate()
  return (
    <RescoringProgress
      campaign={campaign}
      fits={({ fromId }) => fromId === shortlist}
      onFinished={(id) =>
        toast('The new list is there.', {
          duration: 20_000,
          action: {
            label: 'Open the new list',
            onClick: () => void navigate(`/campaigns/${campaign}/shortlists/${id}`),
          },
        })
      }
    />
  )
}
