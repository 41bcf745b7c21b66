import { useMemo, useState } from 'react'
import { flushSync } from 'react-dom'
import { Link, useLocation, useNavigate, useParams } from 'react-router-dom'
import { createTargetSchema } from '../../../shared/targets.ts'
import { checkRule } from '../../../scoring/index.ts'
import { useActions } from '../../actions/useActions.ts'
import { explain } from '../../api/request.ts'
import { useCreateTarget } from '../../api/targets.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { PageHead } from '../../components/ui/Layout.tsx'
import { LeaveDialog } from './LeaveDialog.tsx'
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
  const [fault, setFault] = useState<string | null>(null)
  const [saved, setSaved] = useState(false)
  const sound = useMemo(() => checkRule(text).ok, [text])
  const blocker = useLeaveGuard(!saved && !barred && (text !== start || name !== ''))

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
        void navigate(`/campaigns/${campaignId}/targets/${target.id}`, { replace: true })
      },
      onError: (error) => setFault(explain(error)),
    })
  }

  const unavailable = barred || (!sound && 'The rule has errors; mend them first.')
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
          className="mt-5"
          busy={create.isPending}
          unavailable={unavailable}
        >
          Save the target
        </Button>
      </form>
      <Workbench campaign={campaignId} text={text} onText={setText} />
      <LeaveDialog blocker={blocker} />
    </>
  )
}
