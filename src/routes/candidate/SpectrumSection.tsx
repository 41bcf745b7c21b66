import { useState } from 'react'
import { useQuery } from '@tanstack/react-query'
import { type CandidateGeometry, type CandidateSpectra } from '../../../shared/candidates.ts'
import { candidateSpectraQuery } from '../../api/candidates.ts'
import { SpectrumPlot } from '../../components/charts/SpectrumPlot.tsx'
import { Num } from '../../components/ui/Num.tsx'
import { Failure } from '../../components/ui/States.tsx'
import { useSeen } from '../../lib/useSeen.ts'

/** The largest eigenvalue at once; the whole spectra when the reader comes near, since they take longer. */
export function SpectrumSection({ geometry }: { geometry: CandidateGeometry }) {
  const [place, seen] = useSeen()
  const spectra = useQuery({ ...candidateSpectraQuery(geometry.key), enabled: seen })
  return (
    <div ref={place}>
      <p className="mb-2">
        Largest eigenvalue of the divisor spectrum: <Num value={geometry.topEigenvalue} digits={6} />
      </p>
      {spectra.data ? (
        <Spectra spectra={spectra.data} />
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

function Spectra({ spectra: { key, divisorSpectrum, basisSpectrum, basis } }: { spectra: CandidateSpectra }) {
  const [which, setWhich] = useState<'divisor' | 'basis'>('divisor')
  return (
    <div>
      <fieldset className="mb-2 flex flex-wrap gap-x-4">
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
