import type { assembleShortlist } from './compute/assembleShortlist.ts'
import type { candidateGeometry, candidateSpectra } from './compute/candidateGeometry.ts'
import type { coneSlice } from './compute/coneSlice.ts'
import type { certifyCandidate } from './compute/certifyCandidate.ts'
import type { classPictures } from './compute/classPictures.ts'
import type { columnCells, drawSample, genericHeights } from './compute/exploreSample.ts'
import type { factsOfEach, factsOfWeights, pointBlocks } from './compute/importBlocks.ts'
import type {
  candidatesOfText,
  factsOfWeightLines,
  placeCandidates,
  weightLinesOfText,
} from './compute/importCandidates.ts'
import type { classCount, classNumbers } from './compute/classCount.ts'
import type { nullCandidates, spectraOfEach } from './compute/nullSpectra.ts'
import type { polytopeStructure } from './compute/polytopeStructure.ts'
import type { polytopeShape } from './compute/polytopeShape.ts'
import type { scoreCandidates } from './compute/scoreCandidates.ts'
import type { summaryOfEach } from './compute/polytopeSummary.ts'
import type { facetGenericFinds, nullChunk, previewChunk, searchSegment } from './compute/segments.ts'
import type { checkSearchResult, readSearchResultText } from './compute/searchResults.ts'
import type { alignCandidates, invariantsOfEach, nearDuplicates } from './compute/relatives.ts'

/** The tasks of the worker threads: pure functions of plain data, by name. */
export interface Tasks {
  'point-blocks': typeof pointBlocks
  'facts-of-each': typeof factsOfEach
  'facts-of-weights': typeof factsOfWeights
  'candidates-of-text': typeof candidatesOfText
  'place-candidates': typeof placeCandidates
  'score-candidates': typeof scoreCandidates
  'assemble-shortlist': typeof assembleShortlist
  'weight-lines': typeof weightLinesOfText
  'facts-of-weight-lines': typeof factsOfWeightLines
  'polytope-shape': typeof polytopeShape
  'summary-of-each': typeof summaryOfEach
  'polytope-structure': typeof polytopeStructure
  'class-numbers': typeof classNumbers
  'class-count': typeof classCount
  'candidate-geometry': typeof candidateGeometry
  'candidate-spectra': typeof candidateSpectra
  'cone-slice': typeof coneSlice
  'null-candidates': typeof nullCandidates
  'spectra-of-each': typeof spectraOfEach
  'certify-candidate': typeof certifyCandidate
  'class-pictures': typeof classPictures
  'invariants-of-each': typeof invariantsOfEach
  'near-duplicates': typeof nearDuplicates
  'align-candidates': typeof alignCandidates
  'read-search-result': typeof readSearchResultText
  'check-search-result': typeof checkSearchResult
  'search-segment': typeof searchSegment
  'null-chunk': typeof nullChunk
  'preview-chunk': typeof previewChunk
  'draw-sample': typeof drawSample
  'column-cells': typeof columnCells
  'generic-heights': typeof genericHeights
  'facet-generic-finds': typeof facetGenericFinds
}

export type TaskName = keyof Tasks
export type TaskInput<Name extends TaskName> = Parameters<Tasks[Name]>[0]
export type TaskOutput<Name extends TaskName> = ReturnType<Tasks[Name]>

/** Thrown errors lose their code on the way between threads, so failures travel as values. */
export type TaskAnswer<Value> =
  | { readonly ok: true; readonly value: Value }
  | {
      readonly ok: false
      readonly kind: 'input'
      readonly code: string
      readonly message: string
      readonly path: string
      readonly found: unknown
    }
  | { readonly ok: false; readonly kind: 'bug'; readonly message: string; readonly stack: string | undefined }
