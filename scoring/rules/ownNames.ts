import type { CostClass, Stage } from '../observables/observable.ts'
import { checkedText, type Checked } from './check.ts'
import type { Span } from './ast.ts'
import { dearest, mentionsOf } from './mentions.ts'
import { typeName } from './typed.ts'
import { unitOf } from './unitOf.ts'

/** A name given with `let`, with what is known of its value. */
export interface OwnName extends Span {
  readonly name: string
  /** In words; null where the definition has an error. */
  readonly type: string | null
  /** Null where it follows from no unit of the observables, and for conditions. */
  readonly unit: string | null
  readonly stage: Stage | null
  readonly cost: CostClass | null
  /** The expression as it is written. */
  readonly definition: string
}

/** The names that a text gives with `let`, in its order; the text may have errors. */
export const ownNames = (text: string): readonly OwnName[] => ownNamesOf(text, checkedText(text).checker)

/** The same of a text that was checked already. */
export function ownNamesOf(text: string, { scope, place }: Pick<Checked, 'scope' | 'place'>): OwnName[] {
  return [...scope.lets.values()].map(({ name, definition }) => ({
    name: name.text,
    from: name.from,
    to: name.to,
    type: definition ? typeName(definition.type) : null,
    unit: definition ? unitOf(definition) : null,
    stage: definition?.stage ?? null,
    cost: definition ? dearest(mentionsOf([definition], place)) : null,
    definition: definition ? text.slice(definition.from, definition.to).replace(/\s+/g, ' ') : '',
  }))
}
