import { type ReactNode } from 'react'
import { type UseQueryResult } from '@tanstack/react-query'
import { ApiError, explain } from '../../api/request.ts'
import { Button } from './Button.tsx'

/** Shown while something is on its way; says what. */
export function Loading({ what }: { what: string }) {
  return (
    <p role="status" className="flex items-center gap-2 py-6 text-soft">
      <span className="size-2 animate-pulse rounded-full bg-action" aria-hidden />
      Loading {what}…
    </p>
  )
}

/** Nothing there yet: says so and what to do about it. */
export function Empty({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <div className="py-6">
      <p className="font-serif text-base">{title}</p>
      {children !== undefined && <div className="prose-line mt-1 text-soft">{children}</div>}
    </div>
  )
}

/** A failure, with its code for those who will be asked about it, and a way to try again. */
export function Failure({ error, retry, title }: { error: unknown; retry?: () => void; title?: string }) {
  return (
    <div role="alert" className="border-l-2 border-rejected py-2 pl-3">
      {title && <p className="font-medium">{title}</p>}
      <p className="prose-line">{explain(error)}</p>
      {error instanceof ApiError && <p className="font-mono text-xs text-soft">{error.code}</p>}
      {retry && (
        <Button className="mt-2" onClick={retry}>
          Try again
        </Button>
      )}
    </div>
  )
}

interface QueryViewProps<Data> {
  query: UseQueryResult<Data>
  /** What is being loaded, as in "Loading the library…". */
  what: string
  children: (data: Data) => ReactNode
}

/** Loading, error and content of one query. Content that is already there stays while a newer one loads. */
export function QueryView<Data>({ query, what, children }: QueryViewProps<Data>) {
  if (query.data !== undefined) return <>{children(query.data)}</>
  if (query.isError) {
    return (
      <Failure title={`Could not load ${what}.`} error={query.error} retry={() => void query.refetch()} />
    )
  }
  return <Loading what={what} />
}
