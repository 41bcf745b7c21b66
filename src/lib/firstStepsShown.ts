import { useRemembered } from './remembered.ts'

/** Whether an account has put the first steps away, or asked for them again; otherwise they show while one is open. */
export function useFirstStepsShown(account: string): [boolean | null, (shown: boolean) => void] {
  const [value, set] = useRemembered(`first-steps.${account}`)
  return [
    value === 'shown' ? true : value === 'away' ? false : null,
    (shown) => set(shown ? 'shown' : 'away'),
  ]
}
