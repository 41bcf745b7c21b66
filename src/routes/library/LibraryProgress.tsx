import { LibraryLoading } from '../../components/library/LibraryLoading.tsx'
import { counted } from '../../lib/numbers.ts'

/** What the server still computes of the library, while it does. */
export function LibraryProgress({
  loading,
  undescribed,
}: {
  loading: { loaded: number; total: number } | null
  undescribed: number
}) {
  return (
    <>
      {loading && (
        <div className="mb-4">
          <LibraryLoading loading={loading} />
        </div>
      )}
      {undescribed > 0 && (
        <p className="mb-4 text-soft">
          Numbers of {counted(undescribed, 'polytope')} are still being computed; until then a filter by such
          a number leaves them out.
        </p>
      )}
    </>
  )
}
