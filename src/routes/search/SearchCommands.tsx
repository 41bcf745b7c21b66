import { useState } from 'react'
import { Download } from 'lucide-react'
import { toast } from 'sonner'
import { type SearchDetail } from '../../../shared/searches.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { type Action } from '../../actions/registry.ts'
import { explain } from '../../api/request.ts'
import { specificationUrl, useSearchCommand, type SearchCommand } from '../../api/searches.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { ButtonLink } from '../../components/ui/Button.tsx'
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

type Deed = { unavailable?: string | false } & ({ run: () => void } | { to: string } | { file: string })

const act = (name: string, label: string, deed: Deed): Action => ({
  ...{ id: `search.${name}`, label, section: 'Search' },
  ...deed,
})

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
        <ActionButton
          key={command}
          kind={command === 'cancel' ? 'danger' : 'plain'}
          busy={send.isPending}
          action={act(command, words[command], {
            unavailable: barred,
            run: () => (command === 'cancel' ? setCancelling(true) : run(command)),
          })}
        />
      ))}
      {canExtend && (
        <ActionButton
          action={act('extend', 'Extend…', {
            unavailable: barred || whyNotExtend(search),
            run: () => setExtending(true),
          })}
        />
      )}
      <ActionButton
        action={act('continue', 'Continue from these…', {
          unavailable: barred || noFinds,
          to: cloneAddress(campaign, search, {
            starts: { kind: 'search', id: search.id, size: Math.min(usualStarts, search.keep) },
          }),
        })}
      />
      <ActionButton
        action={act('clone', 'Clone settings', { unavailable: barred, to: cloneAddress(campaign, search) })}
      />
      <SpecificationLink campaign={campaign} search={search.id} />
      <CompareWith campaign={campaign} search={search} />
      {search.progress.evaluations > 0 && !search.imported && (
        <ActionButton
          action={act('sample', 'Sample of evaluations', {
            to: `/campaigns/${campaign}/explore?search=${search.id}`,
          })}
        />
      )}
      {search.shortlists.map((shortlist) => (
        <ButtonLink key={shortlist.id} to={`/campaigns/${campaign}/shortlists/${shortlist.id}`}>
          {shortlist.name}
        </ButtonLink>
      ))}
      <ActionButton
        kind="primary"
        action={act('shortlist', 'Make a shortlist', {
          unavailable: barredList || noFinds,
          to: assemblyPath(campaign, [search.id]),
        })}
      />
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
  return (
    <ActionButton
      title="The file for “npm run search”, which ends with the same result to the bit"
      action={act('specification', 'Headless SPEC', {
        unavailable: barred,
        file: specificationUrl(campaign, search),
      })}
    >
      <Download size={14} aria-hidden />
      Headless SPEC
    </ActionButton>
  )
}
