import { type Completion } from '../../../scoring/index.ts'

/** Type, unit and cost on one line; a pure number needs no unit. */
export function worthOf({ detail, unit, cost }: Pick<Completion, 'detail' | 'unit' | 'cost'>): string {
  return [detail, unit === '1' ? undefined : unit, cost].filter(Boolean).join(' · ')
}
