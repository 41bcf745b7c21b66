import { useQuery } from '@tanstack/react-query'
import { candidateSpectraQuery } from '../../../api/candidates.ts'
import { SpectrumPlot } from '../../../components/charts/SpectrumPlot.tsx'
import { QueryView } from '../../../components/ui/States.tsx'
import { useSeen } from '../../../lib/useSeen.ts'

/** The divisor spectra of two candidates in one plot. */
export function ComparedSpectra({ a, b }: { a: string; b: string }) {
  const [place, seen] = useSeen()
  const one = useQuery({ ...candidateSpectraQuery(a), enabled: seen })
  const two = useQuery({ ...candidateSpectraQuery(b), enabled: seen })
  return (
    <div ref={place} className="min-h-72 max-w-3xl">
      <QueryView query={one} what="the spectrum of A">
        {(spectraA) => (
          <QueryView query={two} what="the spectrum of B">
            {(spectraB) => (
              <SpectrumPlot
                title="Divisor spectra"
                series={[
                  { name: `A ${a.slice(0, 10)}`, values: spectraA.divisorSpectrum },
                  { name: `B ${b.slice(0, 10)}`, values: spectraB.divisorSpectrum },
                ]}
                file={`divisor-spectra-${a.slice(0, 6)}-${b.slice(0, 6)}`}
              />
            )}
          </QueryView>
        )}
      </QueryView>
      <p className="prose-line mt-1 text-xs text-soft">
        Units of M<sub>pl</sub>², each at its own reference point, scale 1; over all prime toric divisors.
      </p>
    </div>
  )
}
