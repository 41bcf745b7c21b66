import { useState, type FormEvent } from 'react'
import { type SearchDetail } from '../../../shared/searches.ts'
import { extendSearchSchema } from '../../../shared/searchRunning.ts'
import { explain } from '../../api/request.ts'
import { useExtendSearch } from '../../api/searches.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'
import { TextField } from '../../components/ui/Field.tsx'
import { formatNumber } from '../../lib/numbers.ts'

interface ExtendDialogProps {
  campaign: string
  search: SearchDetail
  open: boolean
  onOpenChange: (open: boolean) => void
}

/** More budget for a search that has ended or is paused. */
export function ExtendDialog({ campaign, search, open, onOpenChange }: ExtendDialogProps) {
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Extend the search"
      description={
        search.state === 'paused'
          ? 'It goes on with the extension when it is resumed and has used its budget before.'
          : 'It goes on at once from where its budget was used up.'
      }
    >
      <ExtendForm campaign={campaign} search={search} onDone={() => onOpenChange(false)} />
    </Dialog>
  )
}

function ExtendForm({
  campaign,
  search,
  onDone,
}: {
  campaign: string
  search: SearchDetail
  onDone: () => void
}) {
  const extend = useExtendSearch(campaign, search.id)
  const original = search.extensions.reduce((left, more) => left - more, search.budget)
  const [text, setText] = useState(String(original))
  const parsed = extendSearchSchema.safeParse({ evaluations: /^\d+$/.test(text.trim()) ? Number(text) : NaN })
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (parsed.success) extend.mutate(parsed.data, { onSuccess: onDone })
  }
  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      <TextField
        label="Evaluations to add"
        inputMode="numeric"
        value={text}
        error={parsed.success ? null : 'A whole number from 1 to 1 000 000.'}
        hint={`${formatNumber(search.evaluations)} have been made of ${formatNumber(search.budget)}.`}
        onChange={(event) => setText(event.target.value)}
      />
      <p className="prose-line text-xs text-soft">
        The result is the same whenever it is extended: each extension takes effect where the budget before it
        is used up. Annealing makes as many descents again.
      </p>
      {extend.isError && (
        <p role="alert" className="border-l-2 border-rejected pl-2">
          {explain(extend.error)}
        </p>
      )}
      <Button kind="primary" type="submit" busy={extend.isPending} className="self-start">
        {parsed.success ? `Add ${formatNumber(parsed.data.evaluations)} evaluations` : 'Add evaluations'}
      </Button>
    </form>
  )
}
