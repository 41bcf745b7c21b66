import { useState } from 'react'
import { flushSync } from 'react-dom'
import { Link, useLocation, useNavigate, useParams } from 'react-router-dom'
import { toast } from 'sonner'
import { createTargetSchema } from '../../../shared/targets.ts'
import { type StarterTarget } from '../../../shared/starterTargets.ts'
import { useActions } from '../../actions/useActions.ts'
import { explain } from '../../api/request.ts'
import { useCreateTarget } from '../../api/targets.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { useRuleReport, whyUnsound } from '../../components/editor/useRuleReport.ts'
import { recall, remember } from '../../lib/remembered.ts'
import { DraftOffers } from './DraftOffers.tsx'
import { LeaveDialog } from './LeaveDialog.tsx'
import { StarterChoice } from './StarterChoice.tsx'
import { useDraft } from './useDraft.ts'
import { useLeaveGuard } from './useLeaveGuard.ts'
import { Workbench } from './Workbench.tsx'

const start = `# what a good candidate is; the search makes the score as large as it can
at volume 1000
require favourable
score log10(metric.divisor.top)
`

/** A rule that another page hands over to be worked on. */
const draftIn = (state: unknown): string | null =>
  typeof state === 'object' && state !== null && 'draft' in state && typeof state.draft === 'string'
    ? state.draft
    : null

export function NewTargetPage() {
  const { campaignId = '' } = useParams()
  const navigate = useNavigate()
  const location = useLocation()
  const create = useCreateTarget(campaignId)
  const barred = useBarred('targets.edit')
  const [name, setName] = useState('')
  const [text, setText] = useState(() => draftIn(location.state) ?? start)
  const [starter, setStarter] = useState<StarterTarget | null>(null)
  const [fault, setFault] = useState<string | null>(null)
  const [saved, setSaved] = useState(false)
  const checked = useRuleReport(text)
  const begun = starter?.text ?? start
  const changed = text !== begun || (name !== '' && name !== starter?.name)
  const draft = useDraft(`new.${campaignId}`, text, begun, null)
  const { setAside, forget } = draft
  const blocker = useLeaveGuard(!saved && !barred && changed)
  const put = (next: string, what: string) => {
    const before = text
    const own = before !== begun && before !== next
    if (own) setAside(before)
    setText(next)
    if (own) toast(what, { action: { label: 'Undo', onClick: () => setText(before) } })
  }
  const choose = (chosen: StarterTarget) => {
    put(chosen.text, `“${chosen.name}” is in the editor; your text is kept as a draft.`)
    if (name === '' || name === starter?.name) setName(chosen.name)
    setStarter(chosen)
    remember(`scope.${campaignId}`, null)
  }

  const save = () => {
    const parsed = createTargetSchema.safeParse({ name, text })
    if (!parsed.success) {
      setFault('Give the target a name of 1 to 80 characters.')
      return
    }
    setFault(null)
    create.mutate(parsed.data, {
      onSuccess: (target) => {
        flushSync(() => setSaved(true))
        forget()
        // Previews of the saved target go on where those of the new one were.
        const scope = recall(`scope.${campaignId}`) ?? (starter && JSON.stringify(starter.scope))
        remember(`scope.${target.id}`, scope)
        void navigate(`/campaigns/${campaignId}/targets/${target.id}`, { replace: true })
      },
      onError: (error) => setFault(explain(error)),
    })
  }

  const unavailable = barred || whyUnsound(checked)
  useActions([
    {
      ...{ id: 'target.save', label: 'Save the target', section: 'Target' },
      ...{ shortcut: 'Mod+s', unavailable, run: save },
    },
  ])

  return (
    <>
      <PageHead
        title="New target"
        above={
          <Link to={`/campaigns/${campaignId}/targets`} className="hover:underline">
            Targets
          </Link>
        }
      />
      <form
        className="flex flex-wrap items-start gap-3 pb-4"
        onSubmit={(event) => {
          event.preventDefault()
          if (!unavailable) save()
        }}
      >
        <TextField
          label="Name of the target"
          className="w-80 max-w-full"
          maxLength={80}
          value={name}
          error={fault}
          onChange={(event) => setName(event.target.value)}
        />
        <Button
          kind="primary"
          type="submit"
          className="sm:mt-5"
          busy={create.isPending}
          unavailable={unavailable}
        >
          Save the target
        </Button>
      </form>
      <StarterChoice chosen={starter} onChoose={choose} />
      <DraftOffers kept={draft} text={text} onPut={put} />
      <Workbench
        campaign={campaignId}
        text={text}
        onText={setText}
        checked={checked}
        proposed={starter?.scope ?? null}
      />
      <LeaveDialog blocker={blocker} onDrop={forget} />
    </>
  )
}
