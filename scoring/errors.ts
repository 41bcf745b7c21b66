/**
 * A mistake in what a person handed in: a polytope, heights, a rule, a search specification.
 * `code` is stable and public; `path` says where in the input (JSON path, `''` for the whole);
 * `message` names what was found, where, and what would be right.
 */
export class InputError extends Error {
  readonly code: string
  readonly path: string
  readonly found: unknown

  constructor(code: string, message: string, path = '', found: unknown = undefined) {
    super(message)
    this.name = 'InputError'
    this.code = code
    this.path = path
    this.found = found
  }
}

/**
 * A mathematical identity that must hold did not: a bug of ours (or a point outside its cone), never the
 * user's fault. Reported and logged as a bug.
 */
export class InvariantError extends Error {
  constructor(message: string) {
    super(message)
    this.name = 'InvariantError'
  }
}
