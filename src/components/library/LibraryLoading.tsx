import { useQuery } from '@tanstack/react-query'
import { hodgeQuery } from '../../api/polytopes.ts'
import { Progress } from '../ui/Progress.tsx'
import { formatNumber } from '../../lib/numbers.ts'

interface Loading {
  loaded: number
  total: number
}

/** How far the bundled library has been loaded at the first start; null when it is there. */
export function useLibraryLoading(campaign: string | undefined, wanted = true): Loading | null {
  const { data } = useQuery({ ...hodgeQuery({ campaign }), enabled: wanted })
  const loading = data?.loading ?? null
  return wanted && loading && loading.loaded < loading.total ? loading : null
}

export function LibraryLoading({ loading }: { loading: Loading }) {
  return (
    <div className="max-w-md">
      <p className="mb-1 text-soft">
        The bundled library is still being loaded: {formatNumber(loading.loaded)} of{' '}
        {formatNumber(loading.total)}.
      </p>
      <Progress value={loading.loaded} most={loading.total} label="Bundled polytopes loaded" />
    </div>
  )
}
