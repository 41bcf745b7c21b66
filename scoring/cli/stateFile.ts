import { closeSync, existsSync, fsyncSync, openSync, readFileSync, renameSync, writeSync } from 'node:fs'
import { z } from 'zod'
import { InputError } from '../errors.ts'
import { stateShape, type SearchState } from '../search/state.ts'

/** The states of a run, one per job (the islands, then the null sample); null: not begun. */
export interface RunStates {
  readonly schema: 'tessellary.run/1'
  readonly jobs: readonly (SearchState | null)[]
}

const shape = z.object({ schema: z.literal('tessellary.run/1'), jobs: z.array(stateShape.nullable()) })

/**
 * The states in a file, null when there is none yet.
 * @throws InputError state.unreadable, state.damaged
 */
export function readStates(file: string): RunStates | null {
  if (!existsSync(file)) return null
  let content: unknown
  try {
    content = JSON.parse(readFileSync(file, 'utf8'))
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error)
    throw new InputError('state.unreadable', `The state file ${file} cannot be read: ${reason}`, '--state')
  }
  if (!shape.safeParse(content).success) {
    throw new InputError('state.damaged', `The file ${file} holds no state of a search.`, '--state')
  }
  return content as RunStates
}

/** Replaces the file in one step: a crash leaves the old states or the new ones. */
export function writeStates(file: string, jobs: RunStates['jobs']): void {
  const beside = `${file}.${process.pid}.tmp`
  const descriptor = openSync(beside, 'w')
  try {
    writeSync(descriptor, JSON.stringify({ schema: 'tessellary.run/1', jobs } satisfies RunStates))
    fsyncSync(descriptor)
  } finally {
    closeSync(descriptor)
  }
  renameSync(beside, file)
}
