import { type ReactNode, type TdHTMLAttributes, type ThHTMLAttributes } from 'react'
import { ArrowDown, ArrowUp } from 'lucide-react'

/** A plain table with 32 px rows that scrolls sideways in its own frame. */
export function Table({
  label,
  children,
  fit,
  className = '',
}: {
  label: string
  children: ReactNode
  /** As wide as its content, not as the page. */
  fit?: boolean
  className?: string
}) {
  return (
    <div className="relative overflow-x-auto" tabIndex={0} role="group" aria-label={`${label}, scrolls`}>
      <table className={`border-collapse text-sm ${fit ? '[&_td]:px-3 [&_th]:px-3' : 'w-full'} ${className}`}>
        <caption className="sr-only">{label}</caption>
        {children}
      </table>
    </div>
  )
}

interface CellProps {
  /** Right-aligned with tabular figures. */
  numeric?: boolean
}

const cell = 'h-8 px-2 first:pl-0 last:pr-0 border-b whitespace-nowrap'

export function Th({
  numeric,
  className = '',
  children,
  ...rest
}: CellProps & ThHTMLAttributes<HTMLTableCellElement>) {
  return (
    <th
      scope="col"
      {...rest}
      className={`${cell} border-edge text-xs font-medium text-soft ${numeric ? 'text-right' : 'text-left'} ${className}`}
    >
      {children}
    </th>
  )
}

export function Td({ numeric, className = '', ...rest }: CellProps & TdHTMLAttributes<HTMLTableCellElement>) {
  return (
    <td {...rest} className={`${cell} ${numeric ? 'text-right tabular-nums' : 'text-left'} ${className}`} />
  )
}

export function SortButton({
  active,
  order,
  title,
  onClick,
  children,
}: {
  active: boolean
  order: 'asc' | 'desc'
  title?: string
  onClick: () => void
  children: ReactNode
}) {
  const Arrow = order === 'asc' ? ArrowUp : ArrowDown
  return (
    <button
      type="button"
      title={title}
      onClick={onClick}
      className="inline-flex items-center gap-0.5 hover:text-action"
    >
      {children}
      {active && <Arrow size={12} aria-hidden />}
    </button>
  )
}
