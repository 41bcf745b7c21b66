import { useState, type ReactNode } from 'react'
import { type Scope } from '../../../shared/polytopes.ts'
import { isEmptyScope } from './ScopeFields.tsx'

interface ScopeFoldProps {
  scope: Scope
  summary: ReactNode
  className?: string
  children: ReactNode
}

/** Folds the fields of a scope away. It opens by itself for a scope that is still to be chosen, but never closes by itself. */
export function ScopeFold({ scope, summary, className, children }: ScopeFoldProps) {
  const empty = isEmptyScope(scope)
  const [open, setOpen] = useState(empty)
  return (
    <details
      className={className}
      open={open || empty}
      onToggle={(event) => setOpen(event.currentTarget.open)}
    >
      <summary className="text-soft">{summary}</summary>
      {children}
    </details>
  )
}
