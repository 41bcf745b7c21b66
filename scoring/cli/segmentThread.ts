import { JobSession, segmentJob, type SegmentInput, type SegmentOutput } from '../search/jobs.ts'

const session = new JobSession()

/** What a worker thread does with each segment. */
export default function segment(input: SegmentInput): SegmentOutput {
  return segmentJob(input, session)
}
