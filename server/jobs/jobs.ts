import type { CandidateSpectra, ClassPicture } from '../../shared/candidates.ts'
import type { ConeSliceView } from '../../shared/coneSlices.ts'
import type { NullSpectra } from '../../shared/nullSpectra.ts'
import type { ComputedGeometry } from './compute/candidateGeometry.ts'
import type { PolytopeStructure } from '../../shared/polytopeStructure.ts'
import type { PolytopeShape } from './compute/polytopeShape.ts'
import { RecentResults } from '../services/recentResults.ts'
import { CertificationRunner } from './certificationRunner.ts'
import { ClassCounts } from './classCounts.ts'
import { ComputePool, pieceLimitMilliseconds } from './computePool.ts'
import { Explorations } from './explorations.ts'
import { InvariantsFiller } from './invariantsFiller.ts'
import type { JobParts } from './jobParts.ts'
import { CostProbes } from './costProbes.ts'
import { NullSampler, nullSampleSize } from './nullSampler.ts'
import { segmentMilliseconds } from './pace.ts'
import { Previews } from './previews.ts'
import { RescoringRunner } from './rescoringRunner.ts'
import { Scheduler } from './scheduler.ts'
import { SearchRunner } from './searchRunner.ts'
import { StorageGate } from './storageGate.ts'

/** Everything that runs beside the requests. */
export interface Jobs {
  readonly scheduler: Scheduler
  readonly storage: StorageGate
  readonly background: ComputePool
  readonly interactive: ComputePool
  /** A thread for what somebody waits for, but that takes seconds at the largest h11: whole spectra. */
  readonly unhurried: ComputePool
  readonly searches: SearchRunner
  readonly certifications: CertificationRunner
  readonly rescorings: RescoringRunner
  readonly previews: Previews
  /** What evaluations cost, by scope and rule. */
  readonly costs: CostProbes
  /** Candidates of a null sample, by the number of points of the largest polytope. */
  readonly nullSize: (pointsMax: number) => number
  /** Observables over samples. */
  readonly explorations: Explorations
  /** Wall-type invariants of candidates, in the background. */
  readonly invariants: InvariantsFiller
  /** What polytope pages show, by polytope key. */
  readonly shapes: RecentResults<PolytopeShape>
  /** Divisors and sections of polytopes, by polytope key. */
  readonly structures: RecentResults<PolytopeStructure>
  readonly classCounts: ClassCounts
  /** Dossiers, by candidate key. */
  readonly geometries: RecentResults<ComputedGeometry>
  readonly spectra: RecentResults<Omit<CandidateSpectra, 'key'>>
  /** By candidate key and directions. */
  readonly slices: RecentResults<ConeSliceView>
  /** By polytope key. */
  readonly nullSpectra: RecentResults<NullSpectra>
  readonly pictures: RecentResults<ClassPicture>
  close(): Promise<void>
}

export interface JobOptions {
  /** Worker file of all threads, where it is not the one beside the server's entry (tests take the built one). */
  readonly worker?: URL
  /** Worker file of the background threads (tests put a misbehaving one here). */
  readonly backgroundWorker?: URL
  /** Heap of a background thread. */
  readonly heapMegabytes?: number
  /** See `segmentMilliseconds`. */
  readonly segmentMilliseconds?: number
  /** See `pieceLimitMilliseconds`. */
  readonly pieceLimitMilliseconds?: number
  /** Size of null samples, by the number of points of the largest polytope. */
  readonly nullSize?: (pointsMax: number) => number
}

/**
 * Threads yield to the web side: on Linux a thread's nice value is its own. Interactive work yields less than
 * searches do, so that a saturated pool does not hold up what somebody waits for.
 */
const backgroundNice = 10
const interactiveNice = 2

/** Somebody who thinks about a rule for some minutes finds the sample's geometry still there. */
const interactiveIdleMilliseconds = 20 * 60_000

export function openJobs(
  parts: Pick<JobParts, 'source' | 'writes' | 'streams' | 'log'> & { readonly workers: number },
  options: JobOptions = {},
): Jobs {
  const { workers, ...shared } = parts
  const { log } = shared
  const closing = new AbortController()
  const own = options.worker ? { workerFile: options.worker } : {}
  const background = new ComputePool({
    ...own,
    threads: workers,
    nice: backgroundNice,
    log,
    ...(options.backgroundWorker ? { workerFile: options.backgroundWorker } : {}),
    ...(options.heapMegabytes ? { heapMegabytes: options.heapMegabytes } : {}),
  })
  const interactive = new ComputePool({
    ...own,
    threads: 1,
    nice: interactiveNice,
    log,
    idleMilliseconds: interactiveIdleMilliseconds,
  })
  const unhurried = new ComputePool({ ...own, threads: 1, nice: backgroundNice, log })
  const scheduler = new Scheduler(workers, {
    broken: (source, error) =>
      log.error({ err: error, campaign: source.campaignId }, 'a source of work broke and was removed'),
  })
  const storage = new StorageGate({
    closing: closing.signal,
    changed: (trouble) => {
      if (trouble === null) {
        log.info('the storage takes writes again')
        scheduler.release()
      } else {
        log.warn({ code: trouble.code }, trouble.message)
        scheduler.hold()
      }
      shared.streams.toAll({ kind: 'changed', what: 'searches' })
    },
  })
  const all: JobParts = {
    ...shared,
    scheduler,
    storage,
    background,
    interactive,
    segmentMilliseconds: options.segmentMilliseconds ?? segmentMilliseconds,
    pieceLimitMilliseconds: options.pieceLimitMilliseconds ?? pieceLimitMilliseconds,
    closing: closing.signal,
  }
  const certifications = new CertificationRunner(all)
  const explorations = new Explorations(all)
  const rescorings = new RescoringRunner(all)
  const searches = new SearchRunner(all, new NullSampler(all, options.nullSize))
  return {
    scheduler,
    storage,
    background,
    interactive,
    unhurried,
    searches,
    certifications,
    rescorings,
    previews: new Previews(all),
    costs: new CostProbes(interactive),
    nullSize: options.nullSize ?? nullSampleSize,
    explorations,
    invariants: new InvariantsFiller(all),
    shapes: new RecentResults(200),
    structures: new RecentResults(100),
    classCounts: new ClassCounts(all),
    geometries: new RecentResults(60),
    spectra: new RecentResults(200),
    slices: new RecentResults(200),
    nullSpectra: new RecentResults(200),
    pictures: new RecentResults(500),
    close: async () => {
      closing.abort(new Error('The server is shutting down.'))
      scheduler.stop()
      searches.stop()
      certifications.stop()
      explorations.stopAll()
      rescorings.stop()
      await Promise.all([background.close(), interactive.close(), unhurried.close()])
    },
  }
}
