import { InputError } from '../scoring/index.ts'
import { assembleShortlist } from './jobs/compute/assembleShortlist.ts'
import { candidateGeometry, candidateSpectra } from './jobs/compute/candidateGeometry.ts'
import { coneSlice } from './jobs/compute/coneSlice.ts'
import { certifyCandidate } from './jobs/compute/certifyCandidate.ts'
import { classPictures } from './jobs/compute/classPictures.ts'
import { columnCells, drawSample, genericHeights } from './jobs/compute/exploreSample.ts'
import { factsOfEach, factsOfWeights, pointBlocks } from './jobs/compute/importBlocks.ts'
import {
  candidatesOfText,
  factsOfWeightLines,
  placeCandidates,
  weightLinesOfText,
} from './jobs/compute/importCandidates.ts'
import { classCount, classNumbers } from './jobs/compute/classCount.ts'
import { nullCandidates, spectraOfEach } from './jobs/compute/nullSpectra.ts'
import { polytopeStructure } from './jobs/compute/polytopeStructure.ts'
import { polytopeShape } from './jobs/compute/polytopeShape.ts'
import { scoreCandidates } from './jobs/compute/scoreCandidates.ts'
import { summaryOfEach } from './jobs/compute/polytopeSummary.ts'
import { facetGenericFinds, nullChunk, previewChunk, searchSegment } from './jobs/compute/segments.ts'
import { checkSearchResult, readSearchResultText } from './jobs/compute/searchResults.ts'
import { alignCandidates, invariantsOfEach, nearDuplicates } from './jobs/compute/relatives.ts'
import type { TaskAnswer, TaskInput, TaskName, TaskOutput, Tasks } from './jobs/tasks.ts'

const tasks: Tasks = {
  'point-blocks': pointBlocks,
  'facts-of-each': factsOfEach,
  'facts-of-weights': factsOfWeights,
  'candidates-of-text': candidatesOfText,
  'place-candidates': placeCandidates,
  'score-candidates': scoreCandidates,
  'assemble-shortlist': assembleShortlist,
  'weight-lines': weightLinesOfText,
  'facts-of-weight-lines': factsOfWeightLines,
  'polytope-shape': polytopeShape,
  'summary-of-each': summaryOfEach,
  'polytope-structure': polytopeStructure,
  'class-numbers': classNumbers,
  'class-count': classCount,
  'candidate-geometry': candidateGeometry,
  'candidate-spectra': candidateSpectra,
  'cone-slice': coneSlice,
  'null-candidates': nullCandidates,
  'spectra-of-each': spectraOfEach,
  'certify-candidate': certifyCandidate,
  'class-pictures': classPictures,
  'invariants-of-each': invariantsOfEach,
  'near-duplicates': nearDuplicates,
  'align-candidates': alignCandidates,
  'read-search-result': readSearchResultText,
  'check-search-result': checkSearchResult,
  'search-segment': searchSegment,
  'null-chunk': nullChunk,
  'preview-chunk': previewChunk,
  'draw-sample': drawSample,
  'column-cells': columnCells,
  'generic-heights': genericHeights,
  'facet-generic-finds': facetGenericFinds,
}

/** Entry of a worker thread: runs one named task and answers with its value or its failure. */
export default function work<Name extends TaskName>(job: {
  readonly name: Name
  readonly input: TaskInput<Name>
}): TaskAnswer<TaskOutput<Name>> {
  try {
    const task = tasks[job.name] as (input: TaskInput<Name>) => TaskOutput<Name>
    return { ok: true, value: task(job.input) }
  } catch (error) {
    if (error instanceof InputError) {
      const { code, message, path, found } = error
      return { ok: false, kind: 'input', code, message, path, found }
    }
    if (error instanceof Error) return { ok: false, kind: 'bug', message: error.message, stack: error.stack }
    return { ok: false, kind: 'bug', message: String(error), stack: undefined }
  }
}
