import { useNavigate } from 'react-router-dom'
import { toast } from 'sonner'
import { type ShortlistRow } from '../../../shared/shortlists.ts'
import { type VerdictValue } from '../../../shared/verdicts.ts'
import { useActions } from '../../actions/useActions.ts'
import { type Action } from '../../actions/registry.ts'
import { nextUndecided } from './shortlistView.ts'
import { type Selection } from './useSelection.ts'

interface TriageKeys {
  rows: readonly ShortlistRow[]
  /** Place of the row in hand. */
  at: number
  me: string | null
  barred: string | false
  selection: Selection
  /** Rows that stand side by side: the arrow keys go up and down by as many. */
  abreast: number
  dossier: (key: string) => string
  onCurrent: (key: string) => void
  onDecide: (value: VerdictValue) => void
  onUndo: () => void
}

/** What keys, menus and the palette do with the row in hand. */
export function useTriageActions(keys: TriageKeys): { move: (step: number) => void } {
  const { rows, at, me, barred, selection, abreast, dossier, onCurrent, onDecide, onUndo } = keys
  const navigate = useNavigate()
  const row = rows[at]
  const target = (step: number) => rows[Math.min(rows.length - 1, Math.max(0, at + step))]
  const move = (step: number) => {
    const next = target(step)
    if (next) onCurrent(next.candidateKey)
  }
  const extend = (step: number) => {
    const next = target(step)
    if (!row || !next) return
    selection.extend(row.candidateKey, next.candidateKey)
    onCurrent(next.candidateKey)
  }
  const act = (id: string, shortcut: string | string[], label: string, run: () => void): Action => ({
    ...{ id: `triage.${id}`, section: 'Triage', shortcut, label, run },
  })
  const decide = (id: VerdictValue, shortcut: string, label: string): Action => ({
    ...act(id, shortcut, label, () => onDecide(id)),
    unavailable: barred,
  })
  const sideways = abreast > 1
  useActions([
    decide('verified', 'v', 'Verify (asks for a reason when there is no certificate)'),
    decide('rejected', 'r', 'Reject and go on'),
    decide('undecided', 'u', 'Put back to undecided and go on'),
    {
      ...act('undo', 'z', 'Take the last verdict back, and then those before it', onUndo),
      unavailable: barred,
    },
    act('next', sideways ? ['j', 'ArrowRight'] : ['j', 'ArrowDown'], 'Next candidate', () => move(1)),
    act('previous', sideways ? ['k', 'ArrowLeft'] : ['k', 'ArrowUp'], 'Previous candidate', () => move(-1)),
    ...(sideways
      ? [
          act('below', 'ArrowDown', 'The candidate below', () => move(abreast)),
          act('above', 'ArrowUp', 'The candidate above', () => move(-abreast)),
        ]
      : []),
    act('select', 'x', 'Select or let go', () => row && selection.toggle(row.candidateKey)),
    act('select-to', 'X', 'Select from the last one touched to here', () => {
      if (row) selection.toggle(row.candidateKey, true)
    }),
    act('select-down', ['J', 'Shift+ArrowDown'], 'Select this one and the next', () => extend(1)),
    act('select-up', ['K', 'Shift+ArrowUp'], 'Select this one and the one before', () => extend(-1)),
    act('next-undecided', 'n', 'Next undecided', () => {
      const next = nextUndecided(rows, row?.candidateKey ?? null, me)
      if (next) onCurrent(next)
      else toast('No undecided candidate is left among those shown.')
    }),
    act('dossier', 'o', 'Open the dossier', () => row && void navigate(dossier(row.candidateKey))),
  ])
  return { move }
}
