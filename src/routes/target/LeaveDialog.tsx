import { type Blocker } from 'react-router-dom'
import { Button } from '../../components/ui/Button.tsx'
import { Dialog } from '../../components/ui/Dialog.tsx'

export function LeaveDialog({ blocker }: { blocker: Blocker }) {
  return (
    <Dialog
      open={blocker.state === 'blocked'}
      onOpenChange={(open) => !open && blocker.reset?.()}
      title="Leave without saving?"
      description="The rule in the editor differs from the saved version. Leaving drops the changes."
    >
      <div className="flex flex-wrap gap-2">
        <Button kind="primary" autoFocus onClick={() => blocker.reset?.()}>
          Stay
        </Button>
        <Button kind="danger" onClick={() => blocker.proceed?.()}>
          Leave and drop the changes
        </Button>
      </div>
    </Dialog>
  )
}
