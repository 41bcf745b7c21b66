import { useState, type FormEvent } from 'react'
import { sayFault } from '../../components/shell/sayFault.ts'
import { addMemberSchema, type CampaignDetail } from '../../../shared/campaigns.ts'
import { may, roles, type Role } from '../../../shared/roles.ts'
import { useAddMember, useChangeRole, useRemoveMember } from '../../api/campaigns.ts'
import { explain } from '../../api/request.ts'
import { Button } from '../../components/ui/Button.tsx'
import { ConfirmDialog } from '../../components/ui/ConfirmDialog.tsx'
import { Select, TextField } from '../../components/ui/Field.tsx'
import { Table, Td, Th } from '../../components/ui/Table.tsx'

const roleOptions = roles.map((role) => [role, role] as const)
const roleNotes: Record<Role, string> = {
  lead: 'everything, members and deletion',
  investigator: 'targets, imports, searches, verdicts',
  reviewer: 'verdicts',
  reader: 'reads and exports',
}

export function Members({ campaign }: { campaign: CampaignDetail }) {
  const manages = may(campaign.role, 'members.manage')
  const changeRole = useChangeRole(campaign.id)
  const remove = useRemoveMember(campaign.id)
  const [leaving, setLeaving] = useState<CampaignDetail['members'][number] | null>(null)
  const tell = { onError: (error: Error) => sayFault(explain(error)) }
  return (
    <>
      <Table label="Members" className="max-w-[760px]">
        <thead>
          <tr>
            <Th>Name</Th>
            <Th>E-mail address</Th>
            <Th>Role</Th>
            <Th>May</Th>
            {manages && (
              <Th>
                <span className="sr-only">Remove</span>
              </Th>
            )}
          </tr>
        </thead>
        <tbody>
          {campaign.members.map((member) => (
            <tr key={member.accountId}>
              <Td>{member.name}</Td>
              <Td>{member.email}</Td>
              <Td>
                {manages ? (
                  <select
                    aria-label={`Role of ${member.name}`}
                    value={member.role}
                    className="min-h-7 rounded border border-edge bg-sheet px-1"
                    onChange={(event) =>
                      changeRole.mutate(
                        { accountId: member.accountId, role: event.target.value as Role },
                        tell,
                      )
                    }
                  >
                    {roles.map((role) => (
                      <option key={role}>{role}</option>
                    ))}
                  </select>
                ) : (
                  member.role
                )}
              </Td>
              <Td className="text-soft">{roleNotes[member.role]}</Td>
              {manages && (
                <Td className="text-right">
                  <Button
                    kind="quiet"
                    onClick={() => setLeaving(member)}
                    aria-label={`Remove ${member.name}`}
                  >
                    Remove
                  </Button>
                </Td>
              )}
            </tr>
          ))}
        </tbody>
      </Table>
      <ConfirmDialog
        open={leaving !== null}
        onOpenChange={(open) => !open && setLeaving(null)}
        title={`Remove ${leaving?.name ?? 'the member'}?`}
        word="Remove"
        onConfirm={() => leaving && remove.mutate(leaving.accountId, tell)}
      >
        They lose sight of this campaign at once. What they wrote, searched and decided stays.
      </ConfirmDialog>
      {manages && <AddMember campaign={campaign.id} />}
    </>
  )
}

function AddMember({ campaign }: { campaign: string }) {
  const add = useAddMember(campaign)
  const [email, setEmail] = useState('')
  const [role, setRole] = useState<Role>('reviewer')
  const [fault, setFault] = useState<string | null>(null)
  const submit = (event: FormEvent) => {
    event.preventDefault()
    const parsed = addMemberSchema.safeParse({ email: email.trim(), role })
    if (!parsed.success) {
      setFault('Enter the full e-mail address of an existing account.')
      return
    }
    setFault(null)
    add.mutate(parsed.data, { onSuccess: () => setEmail(''), onError: (error) => setFault(explain(error)) })
  }
  return (
    <form onSubmit={submit} noValidate className="mt-4 flex max-w-[760px] flex-wrap items-start gap-2">
      <TextField
        label="Add a member, by e-mail address"
        type="email"
        className="min-w-60 flex-1"
        value={email}
        error={fault}
        onChange={(event) => setEmail(event.target.value)}
      />
      <Select
        label="Role"
        options={roleOptions}
        value={role}
        onChange={(event) => setRole(event.target.value as Role)}
      />
      <Button type="submit" busy={add.isPending} className="mt-5">
        Add
      </Button>
    </form>
  )
}
