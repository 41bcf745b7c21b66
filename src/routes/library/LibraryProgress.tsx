import { Progress } from '../../components/ui/Progress.tsx'
import { counted, formatNumber } from '../../lib/numbers.ts'

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
        <div className="mb-4 max-w-md">
          <p className="mb-1 text-soft">
            The bundled library is still being loaded: {formatNumber(loading.loaded)} of{' '}
            {formatNumber(loading.total)}.
          </p>
          <Progress value={loading.loaded} most={loading.total} label="Bundled polytopes loaded" />
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
