import { z } from 'zod'
import { InputError } from '../errors.ts'
import { islandBudget, type SearchSettings } from './settings.ts'
import type { SearchState } from './state.ts'

/**
 * Budget that was added to a search, each time in evaluations over all islands. An extension takes effect when an
 * island has used up its budget before it, at exactly that evaluation, whenever it was asked for: so the result is
 * a function of the problem and the list of extensions, whatever the cuts.
 */
export const extensionsSchema = z.array(z.number().int().min(1).max(10_000_000)).max(100)

/** Of an island's state: the extensions that have taken effect. */
export interface ExtendedState {
  readonly by: readonly number[]
  /** Evaluations at which the last of them did. */
  readonly begun: number
}

/** The part of a run between two extensions, as a method sees it. */
export interface Stage {
  /** 0 before the first extension. */
  readonly number: number
  /** The island's evaluations when it began, and those that it may use. */
  readonly begun: number
  readonly budget: number
}

/** The extensions that are still to come for an island, as its shares. */
export function pendingShares(
  { island, extended }: Pick<SearchState, 'island' | 'extended'>,
  extensions: readonly number[],
  islands: number,
): number[] {
  return extensions.slice(extended?.by.length ?? 0).map((budget) => islandBudget({ budget, islands }, island))
}

/**
 * The state with the next extension taken in, where it is due: its budget is used up and there is one more.
 * @returns null where nothing is due
 */
export function nextExtension(
  state: SearchState,
  extensions: readonly number[],
  { islands }: Pick<SearchSettings, 'islands'>,
): SearchState | null {
  const [share] = pendingShares(state, extensions, islands)
  if (state.ended !== null || state.evaluations < state.budget || share === undefined) return null
  const by = extensions.slice(0, (state.extended?.by.length ?? 0) + 1)
  return { ...state, budget: state.budget + share, extended: { by, begun: state.evaluations } }
}

/** @throws InputError state.other-extensions */
export function requireSameExtensions({ extended }: SearchState, extensions: readonly number[]): void {
  const applied = extended?.by ?? []
  if (applied.every((budget, n) => budget === extensions[n])) return
  throw new InputError(
    'state.other-extensions',
    `This state was extended by ${applied.join(', ')} evaluations; the search says ${extensions.join(', ') || 'none'}.`,
    'extensions',
    applied,
  )
}
