import { type ReactNode } from 'react'
import { type UseQueryResult } from '@tanstack/react-query'
import { ApiError, ConnectionError, explain } from '../../api/request.ts'
import { Button } from './Button.tsx'

/** What is on its way: a whole page with its title, or lines of one part. */
export type LoadingShape = 'page' | 'lines'

const widths = ['w-full', 'w-11/12', 'w-full', 'w-10/12', 'w-11/12', 'w-9/12']

/** Holds the place of something that is on its way, and says what to those who listen. Quick answers show none of it. */
export function Loading({ what, shape = 'lines' }: { what: string; shape?: LoadingShape }) {
  return (
    <div aria-busy className="appear-late">
      <span role="status" className="sr-only">
        Loading {what}…
      </span>
      <div aria-hidden className="opacity-60">
        {shape === 'page' && (
          <div className="border-b pt-5 pb-4">
            <div className="my-1 h-7 w-64 max-w-full rounded bg-line" />
            <div className="mt-3 h-3 w-96 max-w-full rounded bg-line" />
          </div>
        )}
        <div className="py-2">
          {widths.map((width, index) => (
            <div key={index} className="flex h-8 items-center border-b">
              <div className={`h-3 rounded bg-line ${width}`} />
            </div>
          ))}
        </div>
      </div>
    </div>
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
      <p className="prose-line">
        {explain(error)}
        {retry &&
          error instanceof ConnectionError &&
          ' What is missing here appears by itself when it is back.'}
      </p>
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
  shape?: LoadingShape
  children: (data: Data) => ReactNode
}

/** Loading, error and content of one query. Content that is already there stays while a newer one loads. */
export function QueryView<Data>({ query, what, shape, children }: QueryViewProps<Data>) {
  if (query.data !== undefined) return <>{children(query.data)}</>
  if (query.isError) {
    return (
      <Failure title={`Could not load ${what}.`} error={query.error} retry={() => void query.refetch()} />
    )
  }
  return <Loading what={what} shape={shape} />
}
