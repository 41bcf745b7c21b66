import { type ButtonHTMLAttributes } from 'react'
import { Link, type LinkProps } from 'react-router-dom'

export type ButtonKind = 'primary' | 'plain' | 'quiet' | 'danger' | 'icon'

const shape =
  'inline-flex items-center justify-center gap-1.5 rounded border min-h-8 text-sm font-medium whitespace-nowrap select-none transition-colors aria-disabled:cursor-not-allowed aria-disabled:opacity-60'
const kinds: Record<ButtonKind, string> = {
  primary: 'px-3 border-action bg-action text-on-action not-aria-disabled:hover:brightness-110',
  plain: 'px-3 border-edge bg-sheet text-ink not-aria-disabled:hover:bg-action-wash',
  quiet: 'px-2 border-transparent text-action not-aria-disabled:hover:bg-action-wash',
  icon: 'w-8 shrink-0 border-transparent text-action not-aria-disabled:hover:bg-action-wash',
  danger: 'px-3 border-rejected bg-sheet text-rejected not-aria-disabled:hover:bg-rejected-wash',
}

export interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  kind?: ButtonKind
  /** Why the button cannot be used now. It stays reachable by keyboard so that the reason can be read. */
  unavailable?: string | false | null
  busy?: boolean
}

/** The look of a button, for what is one to the eye and a link to everything else. */
export const buttonLook = (kind: ButtonKind = 'plain', className = ''): string =>
  `${shape} ${kinds[kind]} ${className}`

export function Button({ kind = 'plain', unavailable, busy, className = '', onClick, ...rest }: ButtonProps) {
  const off = Boolean(unavailable) || busy
  return (
    <button
      type="button"
      {...rest}
      aria-disabled={off || undefined}
      aria-busy={busy || undefined}
      title={unavailable || rest.title}
      className={buttonLook(kind, className)}
      onClick={(event) => {
        if (off) event.preventDefault()
        else onClick?.(event)
      }}
    />
  )
}

export function ButtonLink({ kind = 'plain', className = '', ...rest }: LinkProps & { kind?: ButtonKind }) {
  return <Link {...rest} className={buttonLook(kind, className)} />
}

/** A square button that shows only a symbol; `label` is its name for everyone. */
export function IconButton({ label, ...rest }: ButtonProps & { label: string }) {
  return <Button kind="icon" {...rest} aria-label={label} title={rest.title ?? label} />
}
