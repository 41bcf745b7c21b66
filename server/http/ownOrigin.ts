import type { Request, RequestHandler } from 'express'
import { Refusal } from '../problems.ts'

const readOnly = new Set(['GET', 'HEAD', 'OPTIONS'])

/**
 * Refuses requests that change something and were started by another site's page. Browsers say where a request
 * comes from: in Sec-Fetch-Site, or, older ones, in Origin. Programs send neither and hold no cookie by accident.
 * A body must be JSON (or multipart, on the upload route): a foreign form cannot send JSON without asking first.
 */
export function ownOrigin(baseUrl: string): RequestHandler {
  const ours = new URL(baseUrl).origin
  return (request, _response, next) => {
    if (readOnly.has(request.method)) {
      next()
      return
    }
    if (isForeign(request, ours)) {
      throw new Refusal(403, 'foreign-origin', 'This request was started by a page of another site.')
    }
    const hasBody =
      request.headers['transfer-encoding'] !== undefined || Number(request.headers['content-length']) > 0
    if (hasBody && !request.is(['application/json', 'multipart/form-data'])) {
      const found = request.headers['content-type'] ?? ''
      throw new Refusal(415, 'not-json-type', 'Send the request as application/json.', { found })
    }
    next()
  }
}

function isForeign(request: Request, ours: string): boolean {
  const site = request.headers['sec-fetch-site']
  if (site !== undefined) return site !== 'same-origin' && site !== 'none'
  const origin = request.headers.origin
  if (origin === undefined || origin === ours) return false
  return origin !== `${request.protocol}://${request.headers.host ?? ''}`
}
