import { useState } from 'react'
import { Download } from 'lucide-react'
import { toast } from 'sonner'
import { type SearchDetail } from '../../../shared/searches.ts'
import { explain } from '../../api/request.ts'
import { specificationUrl, useSearchCommand, type SearchCommand } from '../../api/searches.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button, ButtonLink } from '../../components/ui/Button.tsx'
import { ConfirmDialog } from '../../components/ui/ConfirmDialog.tsx'
import { assemblyPath } from '../shortlists/new/assemblyAddress.ts'
import { cloneAddress } from '../searches/new/searchPreset.ts'
import { CompareWith } from './CompareWith.tsx'
import { ExtendDialog } from './ExtendDialog.tsx'

const commandsOf: Record<SearchDetail['state'], readonly SearchCommand[]> = {
  queued: ['cancel'],
  running: ['pause', 'cancel'],
  paused: ['resume', 'cancel'],
  finished: [],
  cancelled: [],
  failed: [],
}
const words = { pause: 'Pause', resume: 'Resume', cancel: 'Cancel the search' }

/** Why a search cannot be given more budget, or false. */
function whyNotExtend({ imported, method, progress, state }: SearchDetail): string | false {
  if (imported) return 'This result was run elsewhere; its state is not here to go on from.'
  if (method === 'exhaustive' || progress.exhausted)
    return 'It has ended because nothing new turns up: more budget would not be used.'
  return state !== 'finished' && state !== 'paused' && 'Pause it first, or wait for its end.'
}

/** How many of the best a search goes on from, unless the composer is told otherwise. */
const usualStarts = 50

/** Everything that can be done with a search. */
export function SearchCommands({ campaign, search }: { campaign: string; search: SearchDetail }) {
  const barred = useBarred('searches.run')
  const barredList = useBarred('shortlists.edit')
  const send = useSearchCommand(campaign, search.id)
  const [cancelling, setCancelling] = useState(false)
  const [extending, setExtending] = useState(false)
  const run = (command: SearchCommand) =>
    send.mutate(command, { onError: (error) => toast.error(explain(error)) })
  const noFinds = search.progress.feasible === 0 && 'No feasible candidate has been found yet.'
  const canExtend = search.state === 'finished' || search.state === 'paused'
  return (
    <>
      {commandsOf[search.state].map((command) => (
        <Button
          key={command}
          kind={command === 'cancel' ? 'danger' : 'plain'}
          unavailable={barred}
          busy={send.isPending}
          onClick={() => (command === 'cancel' ? setCancelling(true) : run(command))}
        >
          {words[command]}
        </Button>
      ))}
      {canExtend && (
        <Button unavailable={barred || whyNotExtend(search)} onClick={() => setExtending(true)}>
          Extend…
        </Button>
      )}
      {barred || noFinds ? (
        <Button unavailable={barred || noFinds}>Continue from these…</Button>
      ) : (
        <ButtonLink
          to={cloneAddress(campaign, search, {
            starts: { kind: 'search', id: search.id, size: Math.min(usualStarts, search.keep) },
          })}
        >
          Continue from these…
        </ButtonLink>
      )}
      {barred ? (
        <Button unavailable={barred}>Clone settings</Button>
      ) : (
        <ButtonLink to={cloneAddress(campaign, search)}>Clone settings</ButtonLink>
      )}
      <SpecificationLink campaign={campaign} search={search.id} />
      <CompareWith campaign={campaign} search={search} />
      {search.progress.evaluations > 0 && !search.imported && (
        <ButtonLink to={`/campaigns/${campaign}/explore?search=${search.id}`}>
          Sample of evaluations
        </ButtonLink>
      )}
      {search.shortlists.map((shortlist) => (
        <ButtonLink key={shortlist.id} to={`/campaigns/${campaign}/shortlists/${shortlist.id}`}>
          {shortlist.name}
        </ButtonLink>
      ))}
      {barredList || noFinds ? (
        <Button unavailable={barredList || noFinds}>Make a shortlist</Button>
      ) : (
        <ButtonLink kind="primary" to={assemblyPath(campaign, [search.id])}>
          Make a shortlist
        </ButtonLink>
      )}
      <ConfirmDialog
        open={cancelling}
        onOpenChange={setCancelling}
        title="Cancel this search?"
        word="Cancel the search"
        onConfirm={() => run('cancel')}
      >
        What it has found is kept, but it cannot go on afterwards. To stop for a while, pause it.
      </ConfirmDialog>
      <ExtendDialog campaign={campaign} search={search} open={extending} onOpenChange={setExtending} />
    </>
  )
}

/** The file that the headless search takes, with the same result to the bit. */
function SpecificationLink({ campaign, search }: { campaign: string; search: string }) {
  const barred = useBarred('exports.read')
  if (barred) return <Button unavailable={barred}>Headless SPEC</Button>
  return (
    <a
      href={specificationUrl(campaign, search)}
      download
      title="The file for “npm run search”, which ends with the same result to the bit"
      className="inline-flex min-h-8 items-center gap-1.5 rounded border border-edge bg-sheet px-3 text-sm font-medium hover:bg-action-wash"
    >
      <Download size={14} aria-hidden />
      Headless SPEC
    </a>
  )
}
