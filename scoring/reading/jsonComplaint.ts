import { type z } from 'zod'

export type Issue = z.core.$ZodIssue

/** Of a choice of forms, the complaint of the one that fits best: the one that got deepest. */
export function deepest(issue: Issue): Issue {
  if (issue.code !== 'invalid_union') return issue
  const inner = issue.errors
    .flatMap((issues) => issues.slice(0, 1))
    .map((one) => deepest({ ...one, path: [...issue.path, ...one.path] }))
  return inner.reduce<Issue>((best, one) => (one.path.length > best.path.length ? one : best), {
    ...issue,
    message: inner[0]?.message ?? issue.message,
  })
}

const kinds: Record<string, string> = {
  array: 'a list',
  number: 'a number',
  int: 'an integer',
  string: 'a text',
  object: 'an object',
  boolean: 'true or false',
}

/** What a value is and what it should be. */
export function complaint(issue: Issue, root: unknown, path: string): string {
  const found = issue.path.reduce<unknown>(
    (value, part) =>
      typeof value === 'object' && value !== null ? (value as Record<PropertyKey, unknown>)[part] : undefined,
    root,
  )
  const where = path === '' ? 'The value' : path
  if (issue.code === 'too_small' || issue.code === 'too_big') {
    const needed = String(issue.code === 'too_small' ? issue.minimum : issue.maximum)
    const count = Array.isArray(found) ? found.length : String(found)
    return `${where} has ${count} entries; ${needed} are needed.`
  }
  const right = issue.code === 'invalid_type' ? (kinds[issue.expected] ?? issue.expected) : issue.message
  if (found === undefined) return `${where} is missing; it should be ${right}.`
  const shown = JSON.stringify(found)
  return `${where} is ${shown.length > 24 ? `${shown.slice(0, 24)}…` : shown}; it should be ${right}.`
}
