import { DropdownMenu } from 'radix-ui'
import { ChevronDown } from 'lucide-react'
import { toast } from 'sonner'
import { type Account } from '../../../shared/session.ts'
import { explain } from '../../api/request.ts'
import { useSignOut } from '../../api/session.ts'
import { Button } from '../ui/Button.tsx'

export function AccountMenu({ account, version }: { account: Account; version: string }) {
  const signOut = useSignOut()
  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger asChild>
        <Button kind="quiet" aria-label={`Account: ${account.name}`}>
          <span className="hidden max-w-40 truncate sm:inline">{account.name}</span>
          <span className="sm:hidden" aria-hidden>
            {account.name.slice(0, 1)}
          </span>
          <ChevronDown size={14} aria-hidden />
        </Button>
      </DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content
          align="end"
          sideOffset={4}
          className="z-40 min-w-56 rounded border border-edge bg-sheet p-1 shadow-lifted"
        >
          <DropdownMenu.Label className="px-2 py-1 text-xs text-soft">
            {account.email}
            {version && <div>Tessellary {version}</div>}
          </DropdownMenu.Label>
          <DropdownMenu.Item
            className="cursor-pointer rounded px-2 py-1.5 data-[highlighted]:bg-action-wash"
            onSelect={() => signOut.mutate(undefined, { onError: (error) => toast.error(explain(error)) })}
          >
            Sign out
          </DropdownMenu.Item>
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  )
}
