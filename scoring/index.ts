/**
 * The front door of the engine: all that the server and the client may import. Pure TypeScript, no I/O; also
 * runs in a browser.
 */
export { InputError, InvariantError } from './errors.ts'
export { engineVersion } from './version.ts'
export { caution } from './caution.ts'

// Geometry: polytope -> normal form -> heights -> 2-face class -> numbers -> cone -> metric.
export {
  dualPolytope,
  polytopeFromPoints,
  reducedPolytope,
  type Hodge,
  type Polytope,
  type TwoFace,
} from './geometry/polytope.ts'
export { normalForm, type NormalForm } from './geometry/normalForm.ts'
export { polytopeSummary, type PolytopeSummary } from './geometry/polytopeSummary.ts'
export { reflexiveSections, type ReflexiveSections } from './geometry/sections.ts'
export type { PlanarSection } from './geometry/planarSections.ts'
export type { SolidSection } from './geometry/solidSections.ts'
export { polytopeFromWeights } from './geometry/weights.ts'
export { parsePointBlocks } from './geometry/pointBlocks.ts'
export { quadraticHeights } from './geometry/heights.ts'
export { classFromHeights, type TwoFaceClass } from './geometry/twoFaceClass.ts'
export { rigidDivisors, type RigidDivisors } from './geometry/rigidDivisors.ts'
export { divisorTopology, type DivisorTopology } from './geometry/divisors.ts'
export { ReverseSearch, type WalkPosition } from './geometry/reverseSearch.ts'
export { canonicalClass } from './geometry/classKey.ts'
export { classCountBound, type ClassCountBound } from './geometry/counting/classCountBound.ts'
export { countClasses, type ClassCount } from './geometry/counting/countClasses.ts'
export { facetGenericHeights } from './geometry/fans/facetGenericHeights.ts'
export { originIndex } from './geometry/fans/fanFromSimplices.ts'
export { fanFromHeights, type Fan } from './geometry/fans/fan.ts'
export { heightsOfSimplices, type ProvedTriangulation } from './geometry/fans/heightsOfSimplices.ts'
export { heightsOfTriangles } from './geometry/fans/heightsOfTriangles.ts'
export { intersectionNumbers, type IntersectionNumbers } from './geometry/intersectionNumbers.ts'
export { coneSlice, type ConeSlice, type SliceDirection } from './geometry/coneSlice.ts'
export { nearestLabelling, trianglesApart } from './geometry/classDistance.ts'
export { componentNumbers, componentsOf, type Components } from './geometry/componentNumbers.ts'
export { wallInvariants, wallVersion, type WallInvariants } from './geometry/wallInvariants.ts'
export type { Fibrations, GenusOneFibration, K3Fibration } from './geometry/fibrations.ts'
export { buildCandidate } from './observables/buildCandidate.ts'
export type { Candidate } from './observables/candidate.ts'

// Reading other people's candidates.
export { readCandidates } from './reading/readCandidates.ts'
export { placeCandidate, type PlacedCandidate, type Placing } from './reading/placeCandidate.ts'
export { PlacingSession } from './reading/placingSession.ts'
export { readWeightLines, type WeightLine } from './reading/weightLines.ts'
export type { CandidateReading, GivenCandidate, Orientation, ReadingProblem } from './reading/given.ts'

// The scoring language.
export * from './rules/index.ts'

// The search: one primitive, `advance`, and what is made of it.
export { advance, startState, type Segment, type SegmentOptions } from './search/advance.ts'
export {
  easyRate,
  enrichment,
  fewestIslands,
  isEasy,
  rarityOf,
  searchRate,
  type Enrichment,
  type Rarity,
  type SearchRate,
} from './search/islandRates.ts'
export { CandidateCache } from './search/candidateCache.ts'
export { interleaved, thinned, type Curve } from './search/curve.ts'
export { extensionsSchema } from './search/extensions.ts'
export type { Find } from './search/find.ts'
export { codeOfHeights, heightsOfCode } from './search/heightsCode.ts'
export { rankedScores, rarenessOf, type Rareness, type RankedScores } from './search/rankedScores.ts'
export { hitsAbove } from './search/searchStatistics.ts'
export { Histogram, type HistogramState, type HistogramView } from './search/histogram.ts'
export { drawCandidates, drawnLimit, type DrawnCandidate } from './search/drawnCandidates.ts'
export type { Evaluated, IslandHooks } from './search/island.ts'
export { mergeIslands, type MergedIslands } from './search/islands.ts'
export {
  checkedSettings,
  JobSession,
  previewChunk,
  segmentJob,
  type JobError,
  type PreviewInput,
  type PreviewOutput,
  type PreviewRow,
  type SegmentInput,
  type SegmentOutput,
} from './search/jobs.ts'
export { OutcomeMemo } from './search/memo.ts'
export { feasibleKind } from './search/merit.ts'
export { isMethodName, methodNames, methods, usesStarts, type MethodName } from './search/methods.ts'
export { nullProblem, nullSample, nullSizeLimit, nullSummary, type NullSummary } from './search/nullSample.ts'
export {
  FormCache,
  polytopeSource,
  type PolytopeEntry,
  type PolytopeSource,
} from './search/polytopeSource.ts'
export { problemDigest, type SearchProblem } from './search/problem.ts'
export {
  mergedProgress,
  progressOf,
  type IslandProgress,
  type SearchProgressReport,
} from './search/progress.ts'
export { nullLaw } from './search/sampling.ts'
export { nullLawNames, nullLaws, type NullLawName } from './search/nullLaws.ts'
export { mergedSurrogate, type SurrogateReport } from './search/surrogate/report.ts'
export {
  islandBudget,
  searchSettingsSchema,
  stateLimitBytes,
  type SearchSettings,
} from './search/settings.ts'
export { checkedFind, readSearchResult, type ListedFind, type SearchResult } from './reading/searchResult.ts'
export { startLimit, type GivenStart } from './search/givenStarts.ts'
export { timedCandidate, type Clock, type StageCosts } from './search/stageClock.ts'
export type { Json, RunEnd, SampledRow, SampleRow, SearchCounts, SearchState } from './search/state.ts'
export { expectedBest, medianOf, quantileOf, rateOf, type Rate } from './search/statistics.ts'

// Lists from the finds of runs.
export { assemble, type Assembly, type AssemblyRule, type LeftOut } from './ranking/assemble.ts'
export { ClassSeparation } from './ranking/classSeparation.ts'
export { paretoAxesLimit } from './ranking/paretoFronts.ts'
export { compareContenders, type Contender } from './ranking/rankOrder.ts'

// Headless evaluation, also behind the dossier.
export {
  evaluateInput,
  evaluationUnits,
  scoreEntry,
  type DivisorEntry,
  type Evaluation,
  type EvaluationInput,
  type EvaluationPart,
  type MetricEntry,
  type ReferenceEntry,
  type ScoreEntry,
} from './evaluation.ts'
export { evaluationInputSchema, evaluationParts, ruleOfInput } from './evaluation/input.ts'

// Certificates: the fast road's claims checked by an independent one.
export { certify, type CertificateRequest } from './certificates/certify.ts'
export { certificateRequest } from './certificates/requestOfInput.ts'
export { recheck, type CertificateProblem, type Recheck } from './certificates/recheck.ts'
export { certificateSchema, type Certificate } from './certificates/schema.ts'
export { certifierVersion } from './certify/independentRoad.ts'
export { facetGenericity, facetsAreGeneric } from './certify/facetTriangulation.ts'
