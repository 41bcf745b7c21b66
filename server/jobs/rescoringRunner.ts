import { Rescoring } from '../entities/rescoring.ts'
import { Refusal } from '../problems.ts'
import { failRescoring, takeRescoring } from '../services/rescoringCommits.ts'
import { readRescoring } from '../services/rescorings.ts'
import { requireSoundRule } from '../services/rules.ts'
import type { JobParts } from './jobParts.ts'
import { LeasedRuns } from './leasedRuns.ts'
import { RunningRescoring } from './runningRescoring.ts'

/** Works off the requests to score lists anew. */
export class RescoringRunner {
  readonly #parts: JobParts
  readonly #runs: LeasedRuns<RunningRescoring>

  constructor(parts: JobParts) {
    this.#parts = parts
    this.#runs = new LeasedRuns(parts, {
      entity: Rescoring,
      word: 're-scoring',
      takeUp: (id, holder) => this.#takeUp(id, holder),
    })
  }

  /** Takes up every request that was open when its process ended, and looks for abandoned ones from time to time. */
  start(): Promise<void> {
    return this.#runs.start()
  }

  stop(): void {
    this.#runs.stop()
  }

  /** Takes up an open request. */
  enqueue(id: string): void {
    this.#runs.enqueue(id)
  }

  /** Lets go of a request that was cancelled: what is in hand is abandoned. */
  release(id: string): void {
    this.#runs.release(id)
  }

  async #takeUp(id: string, holder: string | null): Promise<void> {
    const { source, writes, scheduler, streams, closing } = this.#parts
    const rescoring = await source.manager
      .createQueryBuilder(Rescoring, 'rescoring')
      .addSelect('rescoring.entrants')
      .innerJoinAndSelect('rescoring.targetVersion', 'version')
      .where('rescoring.id = :id', { id })
      .andWhere("rescoring.state IN ('queued', 'running')")
      .getOne()
    if (!rescoring?.targetVersion) return
    const taken = await writes.transaction((manager) => takeRescoring(manager, id, holder))
    if (!taken || closing.aborted) return
    const { targetVersion: version, campaignId } = rescoring
    const tell = async () =>
      streams.toCampaign(campaignId, {
        kind: 'rescoring',
        rescoring: await readRescoring(source.manager, id),
      })
    let sound
    try {
      sound = requireSoundRule(version.text, 'targetVersionId')
    } catch (error) {
      // Sound when it was asked for: the engine has changed since.
      if (!(error instanceof Refusal)) throw error
      const { message } = error
      await writes.transaction((manager) => failRescoring(manager, id, message))
      await tell()
      return
    }
    const { scoringHash, engineVersion } = sound
    const scoring = { version, scoringHash, engineVersion }
    const running = new RunningRescoring(rescoring, scoring, this.#parts, (ended) => this.#runs.forget(ended))
    await running.prepare()
    this.#runs.hold(running)
    await tell()
    scheduler.add(running)
  }
}
