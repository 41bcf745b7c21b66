import { useMemo } from 'react'
import { useSearchParams } from 'react-router-dom'
import { conditionParts } from './listColumns.ts'
import { readView, viewAddress, type ShortlistView } from './shortlistView.ts'

/** Parts of the address; a list writes one as often as it has entries, an empty text takes it out. */
export type AddressChanges = Readonly<Record<string, string | readonly string[]>>

export interface ListAddress {
  readonly view: ShortlistView
  /** The row in hand. */
  readonly current: string | null
  /** Changes parts in place: going back leaves the page. */
  change(changes: AddressChanges): void
  /** The same as a step of its own, which going back undoes. */
  step(changes: AddressChanges): void
  /** Lifts every filter. */
  showAll(): void
  /** As it is kept under a name. */
  readonly saved: string
  /** Opens a view that was kept; going back leaves it. */
  open(address: string): void
}

/** Filters, order, columns and the row in hand, in the address of the page. */
export function useListAddress(): ListAddress {
  const [search, setSearch] = useSearchParams()
  const view = useMemo(() => readView(search), [search])
  const saved = useMemo(() => viewAddress(search), [search])
  const write = (changes: AddressChanges, replace: boolean) =>
    setSearch(
      (before) => {
        const next = new URLSearchParams(before)
        for (const [name, value] of Object.entries(changes)) {
          next.delete(name)
          for (const one of typeof value === 'string' ? [value] : value) {
            if (one !== '') next.append(name, one)
          }
        }
        return next
      },
      // At once: the next key must already mean the row that was just taken in hand.
      { replace, flushSync: true },
    )
  return {
    view,
    saved,
    current: search.get('row'),
    change: (changes) => write(changes, true),
    step: (changes) => write(changes, false),
    showAll: () =>
      write(
        {
          verdict: '',
          certificate: '',
          reviewer: '',
          hits: '',
          text: '',
          ...Object.fromEntries(
            view.conditions.flatMap(({ column }) => conditionParts(column)).map((part) => [part, '']),
          ),
        },
        false,
      ),
    open: (address) => setSearch(new URLSearchParams(address)),
  }
}
