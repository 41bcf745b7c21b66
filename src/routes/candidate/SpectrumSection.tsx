import { useState } from 'react'
import { type CandidateGeometry } from '../../../shared/candidates.ts'
import { SpectrumPlot } from '../../components/charts/SpectrumPlot.tsx'

export function SpectrumSection({ geometry }: { geometry: CandidateGeometry }) {
  const [which, setWhich] = useState<'divisor' | 'basis'>('divisor')
  const { divisorSpectrum, basisSpectrum, basis } = geometry.metric
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
          values={divisorSpectrum}
          file={`divisor-spectrum-${geometry.key.slice(0, 10)}`}
        />
      ) : (
        <SpectrumPlot
          key="basis"
          title="Basis spectrum"
          values={basisSpectrum}
          file={`basis-spectrum-${geometry.key.slice(0, 10)}`}
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
