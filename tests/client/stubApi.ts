import { vi } from 'vitest'

export interface Call {
  method: string
  path: string
  body: unknown
}

type Answer = unknown | ((call: Call) => unknown)

/** An answer with a status other than 200. */
export class Status {
  constructor(
    readonly status: number,
    readonly body: unknown,
  ) {}
}

/**
 * Stands in for the network: answers by "METHOD /path" (query left out) and records every call. A request
 * nobody expected is answered with 404, as the server would.
 */
export function stubApi(answers: Record<string, Answer>): Call[] {
  const calls: Call[] = []
  vi.stubGlobal('fetch', (input: string, init: RequestInit = {}) => {
    const method = init.method ?? 'GET'
    const path = input.replace(/^\/api/, '').replace(/\?.*$/, '')
    const call: Call = {
      method,
      path,
      body: typeof init.body === 'string' ? JSON.parse(init.body) : undefined,
    }
    calls.push(call)
    const found = answers[`${method} ${path}`]
    const answer =
      found === undefined
        ? new Status(404, problem(404, 'not-found', `Nothing stands at ${method} ${path}.`))
        : typeof found === 'function'
          ? (found as (call: Call) => unknown)(call)
          : found
    return Promise.resolve(answer).then((settled) => {
      const { status, body } = settled instanceof Status ? settled : new Status(200, settled)
      return new Response(body === undefined ? null : JSON.stringify(body), {
        status,
        headers: { 'content-type': status >= 400 ? 'application/problem+json' : 'application/json' },
      })
    })
  })
  return calls
}

export function problem(status: number, code: string, detail: string) {
  return { type: `urn:test:${code}`, title: 'Problem', status, code, detail }
}
