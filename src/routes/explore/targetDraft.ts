import { type Place } from '../../../shared/explorations.ts'
import { type ColumnView } from './columnValues.ts'

/** A rule that scores by one column and reports the others, as a start for a target. */
export function targetDraft(columns: readonly ColumnView[], by: number, at: Place, about: string): string {
  const scored = columns[by]
  const reported = columns.filter((_, place) => place !== by)
  return [
    `# from an exploration: ${about.replace(/\s+/g, ' ')}`,
    ...(at.kind === 'scale' && at.value === 1 ? [] : [`at ${at.kind} ${at.value}`]),
    `score ${scored?.expression ?? '0'}`,
    ...(reported.length > 0
      ? [
          `report ${reported
            .map(({ name, expression }) => (name === expression ? expression : `${name} = ${expression}`))
            .join(',\n  ')}`,
        ]
      : []),
    '',
  ].join('\n')
}
