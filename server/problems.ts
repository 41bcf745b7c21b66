import type { z } from 'zod'
import type { PlacedProblem, ruleIssueSchema } from '../shared/problems.ts'

export type RuleIssueView = z.infer<typeof ruleIssueSchema>

interface RefusalDetails {
  readonly path?: string
  readonly found?: unknown
  readonly issues?: readonly RuleIssueView[]
  readonly places?: readonly PlacedProblem[]
}

/**
 * A request that is answered with a problem: the caller's mistake or a passing state, never a bug of ours.
 * `code` is stable and public.
 */
export class Refusal extends Error {
  readonly status: number
  readonly code: string
  readonly details: RefusalDetails

  constructor(status: number, code: string, message: string, details: RefusalDetails = {}) {
    super(message)
    this.name = 'Refusal'
    this.status = status
    this.code = code
    this.details = details
  }
}

export const notSignedIn = () => new Refusal(401, 'not-signed-in', 'Sign in first.')

export const notAllowed = (message: string) => new Refusal(403, 'not-allowed', message)

/** Also for what exists but must not be known to the caller. */
export const notFound = (what: string) => new Refusal(404, 'not-found', `There is no such ${what}.`)

export const conflict = (code: string, message: string) => new Refusal(409, code, message)

export const unprocessable = (code: string, message: string, details: RefusalDetails = {}) =>
  new Refusal(422, code, message, details)
