import { InvariantError } from '../errors.ts'
import type {
  ElementField,
  MembersField,
  NumberSet,
  RecordSet,
  Relation,
  ScalarObservable,
  ValueField,
} from '../observables/observable.ts'
import { STAY, type Frame, type Move, type Resource } from './frame.ts'

/** What a program loads from a candidate: the registry's entries with a value of their own. */
export type Loadable =
  ScalarObservable | ValueField | ElementField | MembersField | NumberSet | RecordSet | Relation

function moved(values: ArrayLike<number>, { divisor, factor }: Move): ArrayLike<number> {
  if (divisor === 1 && factor === 1) return values
  const result = new Float64Array(values.length)
  for (let at = 0; at < result.length; at++) result[at] = (values[at] / divisor) * factor
  return result
}

function read(entry: Loadable, frame: Frame): Resource {
  const { candidate } = frame
  const { scaling } = entry
  const scale = scaling === 'computed' ? frame.scale() : 1
  const move = scaling === 'computed' ? STAY : frame.move(scaling)
  switch (entry.kind) {
    case 'scalar':
      return { kind: 'values', values: moved([entry.read(candidate, scale)], move) }
    case 'value':
    case 'element':
      return { kind: 'values', values: moved(entry.column(candidate, scale), move) }
    case 'numbers':
      return { kind: 'values', values: moved(entry.values(candidate, scale), move) }
    case 'records':
      return { kind: 'values', values: [entry.size(candidate, scale)] }
    case 'members':
      return { kind: 'members', lists: entry.members(candidate, scale) }
    case 'relation':
      return { kind: 'lookup', lookup: entry.bind(candidate, scale) }
  }
}

/**
 * Loads an entry for this evaluation. A stage whose geometry breaks an identity makes the value undefined; any
 * other exception is a bug and passes through.
 */
export function load(entry: Loadable, frame: Frame, index: number): Resource {
  let resource: Resource
  try {
    resource = read(entry, frame)
  } catch (error) {
    if (!(error instanceof InvariantError)) throw error
    resource = { kind: 'failed', message: error.message }
  }
  frame.resources[index] = resource
  return resource
}
