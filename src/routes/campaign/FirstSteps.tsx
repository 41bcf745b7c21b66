import { Link } from 'react-router-dom'
import { Check } from 'lucide-react'
import { type CampaignDetail } from '../../../shared/campaigns.ts'
import { may } from '../../../shared/roles.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { useSession } from '../../api/session.ts'
import { Section } from '../../components/ui/Layout.tsx'
import { useFirstStepsShown } from '../../lib/firstStepsShown.ts'
import { firstSteps } from './stepsToShortlist.ts'

/** The way to a first shortlist, each step a link that is ticked by what the campaign holds. */
export function FirstSteps({ campaign }: { campaign: CampaignDetail }) {
  const { data: session } = useSession()
  const [shown, setShown] = useFirstStepsShown(session?.account?.id ?? '')
  const steps = firstSteps(campaign)
  const next = steps.find(({ done }) => !done)
  const asked = shown ?? next !== undefined
  if (!asked || !may(campaign.role, 'targets.edit')) return null
  return (
    <Section
      margin
      id="first-steps"
      title="A first shortlist"
      note={next ? undefined : 'All four are done.'}
      actions={
        <ActionButton
          kind="quiet"
          action={{
            ...{ id: 'first-steps.away', label: 'Put the first steps away', section: 'Campaign' },
            run: () => setShown(false),
          }}
        >
          Put away
        </ActionButton>
      }
    >
      <ol>
        {steps.map(({ label, says, to, done }, index) => (
          <li key={label} className="flex items-baseline gap-3 border-b py-1.5 last:border-b-0">
            <span
              className={`inline-flex size-5 shrink-0 items-center justify-center self-center rounded-full border text-xs ${done ? 'border-verified text-verified' : 'border-edge text-soft'}`}
            >
              {done ? <Check size={12} aria-hidden /> : <span aria-hidden>{index + 1}</span>}
            </span>
            <span className="flex min-w-0 flex-wrap gap-x-3">
              <Link
                to={to}
                aria-current={done || next?.label !== label ? undefined : 'step'}
                className={`text-action hover:underline ${label === next?.label ? 'font-medium' : ''}`}
              >
                {label}
                {done && <span className="sr-only"> (done)</span>}
              </Link>
              <span className="text-soft">{says}</span>
            </span>
          </li>
        ))}
      </ol>
    </Section>
  )
}
