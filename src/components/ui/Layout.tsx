import { useEffect, type ReactNode } from 'react'

/** Title line of a page: sets the document's title too. */
export function PageHead({
  title,
  above,
  children,
  actions,
}: {
  title: string
  above?: ReactNode
  children?: ReactNode
  actions?: ReactNode
}) {
  useEffect(() => {
    document.title = `${title} · Tessellary`
  }, [title])
  return (
    <header className="flex flex-wrap items-end gap-x-4 gap-y-2 pt-5 pb-4">
      <div className="min-w-0 flex-1 basis-64">
        {above && <div className="text-xs text-soft">{above}</div>}
        <h1 className="text-xl break-words">{title}</h1>
        {children && <div className="prose-line mt-1 text-soft">{children}</div>}
      </div>
      {actions && <div className="flex flex-wrap items-center gap-2">{actions}</div>}
    </header>
  )
}

/** A part of a page under a hairline. On wide pages its title stands in the margin (`margin`). */
export function Section({
  title,
  note,
  actions,
  margin,
  id,
  children,
}: {
  title: string
  note?: ReactNode
  actions?: ReactNode
  margin?: boolean
  id?: string
  children: ReactNode
}) {
  const label = id ?? title.toLowerCase().replace(/[^a-z0-9]+/g, '-')
  return (
    <section
      aria-labelledby={label}
      className={`border-t py-4 ${margin ? 'lg:grid lg:grid-cols-[200px_minmax(0,1fr)] lg:gap-8' : ''}`}
    >
      <div className="mb-3 flex flex-wrap items-baseline gap-x-4 gap-y-1 lg:mb-2">
        <div className="min-w-0 flex-1">
          <h2 id={label} className="scroll-mt-16 text-base">
            {title}
          </h2>
          {note && <div className="prose-line text-xs text-soft">{note}</div>}
        </div>
        {actions && <div className="flex flex-wrap items-center gap-2">{actions}</div>}
      </div>
      <div className="min-w-0">{children}</div>
    </section>
  )
}

/** Pairs of name and value in one aligned column. */
export function Facts({
  rows,
  className = '',
}: {
  rows: readonly (readonly [ReactNode, ReactNode])[]
  className?: string
}) {
  return (
    <dl className={`grid grid-cols-[max-content_minmax(0,1fr)] gap-x-4 ${className}`}>
      {rows.map(([name, value], index) => (
        <div
          key={index}
          className="col-span-2 grid min-h-7 grid-cols-subgrid items-center border-b last:border-b-0"
        >
          <dt className="text-soft">{name}</dt>
          <dd className="min-w-0 break-words">{value}</dd>
        </div>
      ))}
    </dl>
  )
}
