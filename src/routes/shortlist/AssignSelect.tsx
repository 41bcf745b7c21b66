import { useQuery } from '@tanstack/react-query'
import { toast } from 'sonner'
import { may } from '../../../shared/roles.ts'
import { useAssign } from '../../api/assignments.ts'
import { campaignQuery } from '../../api/campaigns.ts'
import { explain } from '../../api/request.ts'
import { useSession } from '../../api/session.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { counted } from '../../lib/numbers.ts'

/** Hands candidates of a target to somebody who gives verdicts, as soon as a name is chosen. */
export function AssignSelect({
  campaign,
  targetId,
  candidateKeys,
  label,
}: {
  campaign: string
  targetId: string
  candidateKeys: readonly string[]
  label: string
}) {
  const barred = useBarred('verdicts.assign')
  const me = useSession().data?.account?.id
  const members = useQuery({ ...campaignQuery(campaign), select: ({ members }) => members })
  const assign = useAssign(campaign)
  const people = (members.data ?? [])
    .filter(({ role }) => may(role, 'verdicts.give'))
    .sort((a, b) => Number(b.accountId === me) - Number(a.accountId === me))
  const send = (accountId: string | null) =>
    assign.mutate(
      { targetId, candidateKeys: [...candidateKeys], accountId },
      {
        onSuccess: ({ candidateKeys: done, assignee }) =>
          void toast(`${counted(done.length, 'candidate')} assigned to ${assignee?.name ?? 'nobody'}.`),
        onError: (error) => void toast.error(`Not assigned. ${explain(error)}`),
      },
    )
  return (
    <select
      aria-label={label}
      title={barred || label}
      disabled={Boolean(barred) || assign.isPending}
      value=""
      className="min-h-8 rounded border border-edge bg-sheet px-2 text-sm disabled:opacity-60"
      onChange={({ target: { value } }) => value !== '' && send(value === 'nobody' ? null : value.slice(1))}
    >
      <option value="">Assign to…</option>
      {people.map(({ accountId, name }) => (
        <option key={accountId} value={`=${accountId}`}>
          {accountId === me ? `me (${name})` : name}
        </option>
      ))}
      <option value="nobody">nobody</option>
    </select>
  )
}
