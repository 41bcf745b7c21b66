import { useEffect } from 'react'
import { LibraryLoading, useLibraryLoading } from '../library/LibraryLoading.tsx'

/** While the bundled library is being loaded, what matches may still come: it is counted again as polytopes arrive. */
export function NothingMatches({ campaign, again }: { campaign: string; again: () => unknown }) {
  const loading = useLibraryLoading(campaign)
  const loaded = loading?.loaded
  useEffect(() => {
    if (loaded !== undefined) again()
  }, [loaded, again])
  if (!loading) return <p className="text-rejected">No polytope matches; widen the filter.</p>
  return (
    <>
      <p className="text-soft">None of those loaded so far matches.</p>
      <LibraryLoading loading={loading} />
    </>
  )
}
