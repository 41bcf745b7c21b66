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
