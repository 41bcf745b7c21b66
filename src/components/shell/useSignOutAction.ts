import { explain } from '../../api/request.ts'
import { useSignOut } from '../../api/session.ts'
import { sayFault } from './sayFault.ts'

export function useSignOutAction(): () => void {
  const { mutate } = useSignOut()
  return () => mutate(undefined, { onError: (error) => sayFault(explain(error)) })
}
