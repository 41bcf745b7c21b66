import { useEffect } from 'react'
import { type Blocker } from 'react-router-dom'
import { toast } from 'sonner'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'

export function LeaveDialog({ blocker, onDrop }: { blocker: Blocker; onDrop: () => void }) {
  const asking = blocker.state === 'blocked'
  useEffect(() => {
    // A notice would lie over the question.
    if (asking) toast.dismiss()
  }, [asking])
  return (
    <Dialog
      open={asking}
      onOpenChange={(open) => !open && blocker.reset?.()}
      title="Leave without saving?"
      description="The rule in the editor is not saved. A draft stays in this browser and is offered when you come back, unless you drop it."
    >
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" autoFocus onClick={() => blocker.reset?.()}>
          Stay
        </Button>
        <Button onClick={() => blocker.proceed?.()}>Leave, keep the draft</Button>
        <Button
          kind="danger"
          onClick={() => {
            onDrop()
            blocker.proceed?.()
          }}
        >
          Leave and drop the changes
        </Button>
      </div>
    </Dialog>
  )
}
