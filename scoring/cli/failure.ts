import { InputError } from '../errors.ts'

/** What went wrong, as it is printed: bad input (exit status 2) or a fault of ours (1). */
export interface Failure {
  readonly code: string
  readonly message: string
  readonly path: string
  readonly status: 1 | 2
}

export function failureOf(error: unknown, prefix = ''): Failure {
  if (error instanceof InputError) {
    const { code, message } = error
    return { code, message, path: joined(prefix, error.path), status: 2 }
  }
  const message = error instanceof Error ? error.message : String(error)
  return { code: 'engine.failed', message, path: prefix, status: 1 }
}

/** One line: code, path, message. */
export function failureLine({ code, path, message }: Failure): string {
  const line = path === '' ? `${code}: ${message}` : `${code} ${path}: ${message}`
  return line.replaceAll(/\s*\n\s*/g, ' ')
}

function joined(prefix: string, path: string): string {
  return prefix === '' || path === '' || path.startsWith('[') ? prefix + path : `${prefix}.${path}`
}
