import type { Reader, VerdictValue } from '../../shared/verdicts.ts'

/** What stands for a candidate when a new verdict is given. */
export interface Standing {
  readonly value: VerdictValue
  /** null: two people were not asked for when it was given. */
  readonly readers: readonly Reader[] | null
  readonly author: Reader
  readonly targetVersionId: string
}

/**
 * Whose "verified" a new verdict rests on, where the campaign asks for two people: those who said so before, unless
 * something else was said since or of another version of the target, and its author. Nobody counts twice. One that was
 * given before two were asked for counts as its author's.
 *
 * @returns null when two people are not asked for, or the verdict is no "verified"
 */
export function readersAfter(
  asked: boolean,
  standing: Standing | null,
  given: { readonly value: VerdictValue; readonly author: Reader; readonly targetVersionId: string },
): Reader[] | null {
  if (!asked || given.value !== 'verified') return null
  const holds = standing?.value === 'verified' && standing.targetVersionId === given.targetVersionId
  const before = holds ? (standing.readers ?? [standing.author]) : []
  return [...before.filter(({ id }) => id !== given.author.id), given.author]
}
