import { type ReactNode } from 'react'
import { Button, ButtonLink, buttonLook, type ButtonKind } from '../components/ui/Button.tsx'
import { ariaShortcut } from './keys.ts'
import { shortcutsOf, type Action } from './registry.ts'
import { useActions } from './useActions.ts'

interface ActionButtonProps {
  action: Action
  kind?: ButtonKind
  busy?: boolean
  title?: string
  className?: string
  /** What it shows, where that is more than the label. */
  children?: ReactNode
}

const none: readonly Action[] = []

/** The button of an action. While it is on the page the action is in the registry: shortcut, `?` and palette have it. */
export function ActionButton({ action, kind, busy, title, className, children }: ActionButtonProps) {
  useActions(action.standing ? none : [action])
  const content = children ?? action.label
  const shortcuts = shortcutsOf(action)
  const look = {
    className,
    'aria-keyshortcuts': shortcuts.length > 0 ? shortcuts.map(ariaShortcut).join(' ') : undefined,
    title,
  }
  if (action.unavailable || action.run !== undefined)
    return (
      <Button {...look} kind={kind} busy={busy} unavailable={action.unavailable} onClick={action.run}>
        {content}
      </Button>
    )
  if (action.to !== undefined)
    return (
      <ButtonLink {...look} kind={kind} to={action.to}>
        {content}
      </ButtonLink>
    )
  return (
    <a {...look} href={action.file} download className={buttonLook(kind, className)}>
      {content}
    </a>
  )
}
