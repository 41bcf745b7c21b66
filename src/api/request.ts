import { type z } from 'zod'
import { problemSchema, type Problem } from '../../shared/problems.ts'
import { noteLost, noteReached } from './connection.ts'

/** The server said no: a problem document with a stable code, or a plain failure given the same shape. */
export class ApiError extends Error {
  readonly problem: Problem

  constructor(problem: Problem) {
    super(problem.detail || problem.title)
    this.name = 'ApiError'
    this.problem = problem
  }

  get status(): number {
    return this.problem.status
  }

  get code(): string {
    return this.problem.code
  }
}

/** The server could not be reached at all. */
export class ConnectionError extends Error {
  constructor() {
    super('The server cannot be reached. Check that it is running, then try again.')
    this.name = 'ConnectionError'
  }
}

/** The answer does not have the agreed form: client and server are of different versions. */
export class ContractError extends Error {
  constructor(path: string, detail: string) {
    super(
      `The answer to ${path} does not have the expected form (${detail}). Reload the page; the application may have been updated.`,
    )
    this.name = 'ContractError'
  }
}

export interface RequestOptions<Schema extends z.ZodType> {
  schema?: Schema
  method?: 'GET' | 'POST' | 'PATCH' | 'PUT' | 'DELETE'
  /** Sent as JSON, or as it is when it is a form. */
  body?: unknown
  query?: Record<string, string | number | undefined | null>
  signal?: AbortSignal
}

/** `/api` + path with its query; empty values are left out. */
export function apiUrl(path: string, query: RequestOptions<z.ZodType>['query'] = {}): string {
  const search = new URLSearchParams()
  for (const [name, value] of Object.entries(query)) {
    if (value !== undefined && value !== null && value !== '') search.set(name, String(value))
  }
  const text = search.toString()
  return `/api${path}${text ? `?${text}` : ''}`
}

/** A gateway answers for a server that is away. */
const isGatewayAlone = ({ status }: Response) => status === 502 || status === 504

async function problemOf(response: Response): Promise<Problem> {
  const body: unknown = await response.json().catch(() => null)
  const parsed = problemSchema.safeParse(body)
  if (parsed.success) return parsed.data
  const unreachable = isGatewayAlone(response)
  return {
    type: 'about:blank',
    title: response.statusText || `Status ${response.status}`,
    status: response.status,
    code: 'UNEXPECTED_ANSWER',
    detail: unreachable
      ? 'The server does not answer at the moment. Try again in a little while.'
      : `The server answered with status ${response.status} and no explanation.`,
  }
}

/** One request to the API; the answer is checked against its schema. Without a schema the answer is ignored. */
export async function request<Schema extends z.ZodType>(
  path: string,
  options: RequestOptions<Schema> & { schema: Schema },
): Promise<z.output<Schema>>
export async function request(path: string, options?: RequestOptions<z.ZodType>): Promise<void>
export async function request<Schema extends z.ZodType>(
  path: string,
  { schema, method = 'GET', body, query, signal }: RequestOptions<Schema> = {},
): Promise<z.output<Schema> | void> {
  const form = body instanceof FormData
  let response: Response
  try {
    response = await fetch(apiUrl(path, query), {
      method,
      signal,
      credentials: 'same-origin',
      headers: {
        accept: 'application/json, application/problem+json',
        ...(body !== undefined && !form ? { 'content-type': 'application/json' } : {}),
      },
      body: body === undefined ? undefined : form ? body : JSON.stringify(body),
    })
  } catch (error) {
    if (signal?.aborted) throw error
    noteLost()
    throw new ConnectionError()
  }
  if (isGatewayAlone(response)) noteLost()
  else noteReached()
  if (!response.ok) throw new ApiError(await problemOf(response))
  if (!schema) return
  const answer: unknown = await response.json().catch(() => undefined)
  const parsed = schema.safeParse(answer)
  if (!parsed.success) {
    const [first] = parsed.error.issues
    throw new ContractError(
      path,
      first ? `${first.path.join('.') || 'answer'}: ${first.message}` : 'not JSON',
    )
  }
  return parsed.data
}

/** What to tell a person about any failure. */
export function explain(error: unknown): string {
  return error instanceof Error ? error.message : 'Something went wrong that has no explanation yet.'
}
