import { nullLaw } from '../../scoring/index.ts'
import type { NullSpectra } from '../../shared/nullSpectra.ts'
import type { ServerContext } from '../context.ts'
import { rankQuantiles } from '../jobs/compute/nullSpectra.ts'
import { nullSeed } from '../jobs/nullSampler.ts'
import { readPolytope, type Viewer } from './polytopes.ts'

/** Whole spectra up to so many points; above, a full decomposition takes too long to do it often. */
const wholeUpTo = 120
const wholeCount = 60
const topCount = 30
/** Candidates of one piece of work: somebody else's dossier waits for the same thread. */
const pieceOf = (points: number) => (points <= 60 ? 20 : 4)

/** Spectra of candidates of a polytope that nobody selected, for everybody who may see it. */
export async function readNullSpectra(
  { source, jobs }: ServerContext,
  viewer: Viewer,
  key: string,
): Promise<NullSpectra> {
  const { polytope: record } = await readPolytope(source.manager, viewer, key)
  return jobs.nullSpectra.get(key, async () => {
    const polytope = { key, vertices: record.coordinates }
    const whole = record.points <= wholeUpTo
    const drawn = await jobs.unhurried.run('null-candidates', {
      polytope,
      seed: nullSeed,
      count: whole ? wholeCount : topCount,
    })
    const spectra: number[][] = []
    const piece = pieceOf(record.points)
    for (let at = 0; at < drawn.length; at += piece) {
      const candidates = drawn.slice(at, at + piece)
      spectra.push(...(await jobs.unhurried.run('spectra-of-each', { polytope, candidates, whole })))
    }
    return {
      key,
      law: nullLaw.description,
      seed: nullSeed,
      size: drawn.length,
      from: whole ? 1 : record.points - 4,
      quantiles: rankQuantiles(spectra),
    }
  })
}
