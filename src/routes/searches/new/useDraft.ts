import { useEffect, useState } from 'react'
import { useSearchParams } from 'react-router-dom'
import { addressOfDraft, draftFromAddress, namedInAddress, type Draft } from './searchPreset.ts'

/** A seed to start from; a person may put any other. */
const drawSeed = () => String(Math.floor(Math.random() * 1e6))

const usual: Omit<Draft, 'seed'> = {
  target: '',
  version: '',
  scope: { kind: 'polytopes', keys: [] },
  method: 'annealing',
  budget: '2000',
  islands: '2',
  keep: '100',
  descents: '',
  patience: '',
  surrogate: true,
  starts: null,
}

/** The composer's fields, filled in by the address and written to it, so that a search can be passed on unstarted. */
export function useDraft(base: Partial<Draft>): [Draft, (changes: Partial<Draft>) => void] {
  const [address, setAddress] = useSearchParams()
  const [draft, setDraft] = useState<Draft>(() => {
    const given = { ...usual, ...base, ...draftFromAddress(address) }
    return { ...given, seed: draftFromAddress(address).seed ?? drawSeed() }
  })
  const [touched, setTouched] = useState(false)
  useEffect(() => {
    if (!touched) return
    setAddress(
      (before) => {
        const next = addressOfDraft(draft)
        const clone = before.get('clone')
        const isLong = draft.scope.kind === 'polytopes' && draft.scope.keys.length > namedInAddress
        if (clone !== null && isLong) next.set('clone', clone)
        return next
      },
      { replace: true },
    )
  }, [touched, draft, setAddress])
  return [
    draft,
    (changes) => {
      setTouched(true)
      setDraft((before) => ({ ...before, ...changes }))
    },
  ]
}
