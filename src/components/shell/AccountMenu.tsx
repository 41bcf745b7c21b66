import { useId } from 'react'
import { ChevronDown } from 'lucide-react'
import { type Account } from '../../../shared/session.ts'
import { Button } from '../ui/Button.tsx'
import { useSignOutAction } from './useSignOutAction.ts'

/** Who is signed in, and the way out. A native popover: Escape and a click elsewhere close it. */
export function AccountMenu({ account, version }: { account: Account; version: string }) {
  const signOut = useSignOutAction()
  const id = useId()
  return (
    <>
      <Button kind="quiet" aria-label={`Account: ${account.name}`} popoverTarget={id}>
        <span className="hidden max-w-40 truncate sm:inline">{account.name}</span>
        <span className="sm:hidden" aria-hidden>
          {account.name.slice(0, 1)}
        </span>
        <ChevronDown size={14} aria-hidden />
      </Button>
      <div
        id={id}
        popover="auto"
        className="fixed inset-auto top-11 right-[max(1rem,calc((100vw-1440px)/2+1rem))] min-w-56 rounded border border-edge bg-sheet p-1 text-ink shadow-lifted"
      >
        <p className="px-2 py-1 text-xs break-words text-soft">
          {account.email}
          {version && <span className="block">Tessellary {version}</span>}
        </p>
        <Button kind="quiet" className="w-full justify-start" onClick={signOut}>
          Sign out
        </Button>
      </div>
    </>
  )
}
