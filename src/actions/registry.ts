/**
 * The one list of what can be done now. Pages and the frame put their actions in while they are mounted; buttons,
 * shortcuts, the list under `?` and the palette are all made from it.
 */
interface Described {
  /** Lasting name, by which recent use is remembered: 'search.pause'. */
  readonly id: string
  readonly label: string
  /** What it belongs to, as a heading: 'Search', 'Go to'. */
  readonly section: string
  /** KeyboardEvent.key of a single key ('v', '?', 'ArrowDown'), or with Ctrl or Cmd: 'Mod+s'. Several do the same. */
  readonly shortcut?: string | readonly string[]
  /** Why it cannot be done now; it is listed with the reason. */
  readonly unavailable?: string | false | null
  /** Put in by the frame of all pages: a button that shows it does not put it in again. */
  readonly standing?: boolean
}

/** What an action does: go to an address of the application, save a file from one, or run. */
type Deed =
  | { readonly to: string; readonly file?: undefined; readonly run?: undefined }
  | { readonly file: string; readonly to?: undefined; readonly run?: undefined }
  | { readonly run: () => void; readonly to?: undefined; readonly file?: undefined }

export type Action = Described & Deed

/** An action in the registry: however it was described, it can be run. */
export interface LiveAction extends Described {
  readonly run: () => void
}

export const shortcutsOf = ({ shortcut }: Pick<Described, 'shortcut'>): readonly string[] =>
  shortcut === undefined ? [] : typeof shortcut === 'string' ? [shortcut] : shortcut

let live: readonly LiveAction[] = []
const listeners = new Set<() => void>()

function change(next: readonly LiveAction[]): void {
  live = next
  for (const listener of listeners) listener()
}

/** While one develops, two live actions with one name or one key are a mistake; people get the first of them. */
function refuseClash(actions: readonly LiveAction[]): void {
  const names = new Set<string>()
  const keys = new Map<string, LiveAction>()
  for (const action of actions) {
    if (names.has(action.id)) throw new Error(`Two live actions are named “${action.id}”.`)
    names.add(action.id)
    for (const key of shortcutsOf(action)) {
      const other = keys.get(key)
      if (other) throw new Error(`The actions “${other.id}” and “${action.id}” both bind the key “${key}”.`)
      keys.set(key, action)
    }
  }
}

/** Puts actions in; returns the function that takes them out again. */
export function registerActions(actions: readonly LiveAction[]): () => void {
  if (import.meta.env.DEV) refuseClash([...live, ...actions])
  change([...live, ...actions])
  return () => change(live.filter((action) => !actions.includes(action)))
}

export const liveActions = (): readonly LiveAction[] => live

export function subscribeToActions(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}
