import type { MovingNumbers } from '../../geometry/moving/movingNumbers.ts'
import type { Candidate } from '../../observables/candidate.ts'
import { curves } from '../../observables/curves.ts'
import type { ElementField, MembersField, ValueField } from '../../observables/observable.ts'
import { triangles, triples } from '../../observables/triangles.ts'
import type { Resource } from '../frame.ts'
import type { Alignment } from './alignment.ts'

/** A field of a set in which one element can be read alone. */
export type LocalField = (ValueField | ElementField) & Required<Pick<ValueField | ElementField, 'at'>>

export const isLocal = (field: { readonly kind: string; readonly at?: unknown }): field is LocalField =>
  field.at !== undefined

/** The divisors of triples, triangles and curves: lists in the very arrays that follow exchanges. */
const heldInPlace: readonly unknown[] = [triples, triangles, curves].map(({ fields }) =>
  fields.find(({ name }) => name === 'divisors'),
)

export const isHeldInPlace = (entry: unknown): entry is MembersField => heldInPlace.includes(entry)

/** A column that follows exchanges: of an exchange only the touched elements are read again. */
export class LiveColumn {
  readonly resource: Resource
  private readonly values: Float64Array

  constructor(
    private readonly field: LocalField,
    private readonly alignment: Alignment,
    candidate: Candidate,
  ) {
    this.values = Float64Array.from(field.column(candidate, 1))
    this.resource = { kind: 'values', values: this.values }
  }

  /** To be called after every exchange, with the candidate as it is then. */
  exchanged(moving: MovingNumbers, candidate: Candidate): void {
    const { field, values, alignment } = this
    alignment.move(moving, values)
    alignment.touched(moving, (n) => {
      values[n] = field.at(candidate, n)
    })
  }
}
