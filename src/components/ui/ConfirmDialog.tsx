import { type ReactNode } from 'react'
import { Button } from './Button.tsx'
import { Dialog } from './Dialog.tsx'

/** Asks before something that cannot be taken back. */
export function ConfirmDialog({
  open,
  onOpenChange,
  title,
  word,
  onConfirm,
  children,
}: {
  open: boolean
  onOpenChange: (open: boolean) => void
  title: string
  /** What the button does, as a verb. */
  word: string
  onConfirm: () => void
  children: ReactNode
}) {
  return (
    <Dialog open={open} onOpenChange={onOpenChange} title={title} description={children}>
      <div className="flex flex-wrap gap-2">
        <Button
          kind="danger"
          onClick={() => {
            onOpenChange(false)
            onConfirm()
          }}
        >
          {word}
        </Button>
        <Button autoFocus onClick={() => onOpenChange(false)}>
          Leave it as it is
        </Button>
      </div>
    </Dialog>
  )
}
