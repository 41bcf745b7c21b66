import { useState, type FormEvent } from 'react'
import { createTargetSchema, type TargetDetail } from '../../../shared/targets.ts'
import { ActionButton } from '../../actions/ActionButton.tsx'
import { explain } from '../../api/request.ts'
import { useRenameTarget } from '../../api/targets.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextField } from '../../components/ui/Field.tsx'

export function RenameTarget({ campaign, target }: { campaign: string; target: TargetDetail }) {
  const [open, setOpen] = useState(false)
  const [name, setName] = useState(target.name)
  const [fault, setFault] = useState<string | null>(null)
  const rename = useRenameTarget(campaign, target.id)
  const submit = (event: FormEvent) => {
    event.preventDefault()
    const parsed = createTargetSchema.shape.name.safeParse(name)
    if (!parsed.success) {
      setFault('A target needs a name of 1 to 80 characters.')
      return
    }
    setFault(null)
    rename.mutate(parsed.data, {
      onSuccess: () => setOpen(false),
      onError: (error) => setFault(explain(error)),
    })
  }
  return (
    <>
      <ActionButton
        kind="quiet"
        action={{
          ...{ id: 'target.rename', label: 'Rename the target', section: 'Target' },
          run: () => setOpen(true),
        }}
      >
        Rename
      </ActionButton>
      <Dialog open={open} onOpenChange={setOpen} title="Rename the target">
        <form onSubmit={submit} noValidate className="flex flex-col gap-4">
          <TextField
            label="Name"
            maxLength={80}
            autoFocus
            value={name}
            error={fault}
            onChange={(event) => setName(event.target.value)}
          />
          <Button kind="primary" type="submit" busy={rename.isPending} className="self-start">
            Save the name
          </Button>
        </form>
      </Dialog>
    </>
  )
}
