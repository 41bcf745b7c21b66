import { useState } from 'react'
import { useQuery, type UseQueryResult } from '@tanstack/react-query'
import { type CandidateGeometry, type CandidateSpectra } from '../../../shared/candidates.ts'
import { type NullSpectra } from '../../../shared/nullSpectra.ts'
import { candidateSpectraQuery, nullSpectraQuery } from '../../api/candidates.ts'
import { SpectrumPlot, type SpectrumBand } from '../../components/charts/SpectrumPlot.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { useSeen } from '../../lib/useSeen.ts'

/** The largest eigenvalue at once; the whole spectra when the reader comes near, since they take longer. */
export function SpectrumSection({ geometry }: { geometry: CandidateGeometry }) {
  const [place, seen] = useSeen()
  const spectra = useQuery({ ...candidateSpectraQuery(geometry.key), enabled: seen })
  const [compared, setCompared] = useState(false)
  const sample = useQuery({ ...nullSpectraQuery(geometry.polytope.key), enabled: compared })
  return (
    <div ref={place}>
      <p className="mb-2">
        Largest eigenvalue of the divisor spectrum: <Num value={geometry.topEigenvalue} digits={6} />
      </p>
      {spectra.data ? (
        <>
          <Spectra spectra={spectra.data} band={sample.data} />
          <Comparison
            query={sample}
            asked={compared}
            onAsk={() => (sample.isError ? void sample.refetch() : setCompared(true))}
          />
        </>
      ) : spectra.isError ? (
        <Failure
          title="Could not load the spectra."
          error={spectra.error}
          retry={() => void spectra.refetch()}
        />
      ) : (
        <div role="status" aria-busy={seen} className="grid h-72 place-items-center border text-soft">
          Computing all {geometry.polytope.points - 4} eigenvalues…
        </div>
      )}
    </div>
  )
}

/** The offer of a null sample, and what it is when it is there. */
function Comparison({
  query,
  asked,
  onAsk,
}: {
  query: UseQueryResult<NullSpectra>
  asked: boolean
  onAsk: () => void
}) {
  const { data } = query
  if (!data) {
    return (
      <div className="mt-2 print:hidden">
        <Button busy={query.isFetching} onClick={onAsk}>
          {query.isFetching ? 'Computing the null sample…' : 'Compare with the null'}
        </Button>
        {asked && query.isError && <Failure title="The null sample failed." error={query.error} />}
      </div>
    )
  }
  if (data.size < 2)
    return <p className="mt-1 text-xs text-soft">No other class of this polytope turned up.</p>
  return (
    <p className="prose-line mt-1 text-xs text-soft">
      Null: {data.size} unselected candidates of this polytope (seed {data.seed}), quantiles of{' '}
      {data.from === 1
        ? 'the eigenvalues of equal rank'
        : 'the largest eigenvalue only, since whole spectra would take too long'}
      . <span className="print:hidden">{data.law}</span>
    </p>
  )
}

function bandOf(data?: NullSpectra): SpectrumBand | undefined {
  if (!data || data.size < 2) return undefined
  const { size, from, quantiles } = data
  return { label: `null, ${size} candidates`, from, quantiles }
}

function Spectra({
  spectra: { key, divisorSpectrum, basisSpectrum, basis },
  band,
}: {
  spectra: CandidateSpectra
  band?: NullSpectra
}) {
  const [which, setWhich] = useState<'divisor' | 'basis'>('divisor')
  return (
    <div>
      <fieldset className="mb-2 print:hidden flex flex-wrap gap-x-4">
        <legend className="sr-only">Which spectrum</legend>
        {(['divisor', 'basis'] as const).map((kind) => (
          <label key={kind} className="inline-flex items-center gap-1.5">
            <input type="radio" name="spectrum" checked={which === kind} onChange={() => setWhich(kind)} />
            {kind} spectrum
          </label>
        ))}
      </fieldset>
      {which === 'divisor' ? (
        <SpectrumPlot
          key="divisor"
          title="Divisor spectrum"
          series={[{ values: divisorSpectrum }]}
          band={bandOf(band)}
          file={`divisor-spectrum-${key.slice(0, 10)}`}
        />
      ) : (
        <SpectrumPlot
          key="basis"
          title="Basis spectrum"
          series={[{ values: basisSpectrum }]}
          file={`basis-spectrum-${key.slice(0, 10)}`}
        />
      )}
      <p className="prose-line mt-1 text-xs text-soft">
        Units of M<sub>pl</sub>², at the reference point, scale 1.{' '}
        {which === 'divisor'
          ? 'Over all prime toric divisors; does not depend on a choice of basis.'
          : `In the lattice basis ${basis
              .map((i) => `D${i}`)
              .slice(0, 12)
              .join(
                ', ',
              )}${basis.length > 12 ? ', …' : ''}: depends on that choice, by factors; for comparison with the literature only.`}
      </p>
    </div>
  )
}
