import { runLooks } from '../../../components/charts/runLooks.ts'
import { RunSwatch } from '../../../components/charts/RunSwatch.tsx'

/** The letter and line of a search: how tables of a comparison name their columns. */
export function SearchHead({ place, name }: { place: number; name?: string }) {
  return (
    <span className="inline-flex items-center gap-1.5">
      <span className="font-medium text-ink">{runLooks[place]?.letter}</span>
      <RunSwatch place={place} />
      {name !== undefined && <span className="sr-only">{name}</span>}
    </span>
  )
}

/** What a row of a comparison is about; narrow screens break it. */
export function RowName({ children }: { children: string }) {
  return <span className="inline-block max-w-28 py-1.5 sm:max-w-none sm:whitespace-nowrap">{children}</span>
}
