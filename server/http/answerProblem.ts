import { STATUS_CODES } from 'node:http'
import type { ErrorRequestHandler, Response } from 'express'
import { MulterError } from 'multer'
import { z } from 'zod'
import { uploadLimitBytes } from '../../shared/polytopes.ts'
import type { Problem } from '../../shared/problems.ts'
import { Refusal } from '../problems.ts'
import { storageTrouble, type StorageTrouble } from '../storageTrouble.ts'

/** The one error handler: every failure of a request ends here and becomes a problem document. */
export const answerProblem: ErrorRequestHandler = (error, request, response, next) => {
  const refusal = asRefusal(error) ?? fromStorage(error)
  if (refusal === null) request.log.error({ err: error }, 'a request failed through a fault of the server')
  if (response.headersSent) {
    next(error)
    return
  }
  sendProblem(
    response,
    refusal ??
      new Refusal(
        500,
        'internal-error',
        'The server made a mistake. It has been recorded; trying again may help.',
      ),
  )
}

/** Writes the problem document (RFC 9457). */
export function sendProblem(response: Response, refusal: Refusal): void {
  const { path, found, issues, places } = refusal.details
  const problem: Problem = {
    type: `urn:tessellary:problem:${refusal.code}`,
    title: STATUS_CODES[refusal.status] ?? 'Error',
    status: refusal.status,
    code: refusal.code,
    detail: refusal.message,
    ...(path === undefined ? {} : { path }),
    ...(found === undefined ? {} : { found }),
    ...(issues === undefined ? {} : { issues: [...issues] }),
    ...(places === undefined ? {} : { places: [...places] }),
  }
  response.status(refusal.status).type('application/problem+json').send(JSON.stringify(problem))
}

/** The caller's mistakes as refusals; null for bugs. */
function asRefusal(error: unknown): Refusal | null {
  if (error instanceof Refusal) return error
  if (error instanceof z.ZodError) return fromZod(error)
  if (error instanceof MulterError) return fromMulter(error)
  return fromBodyParser(error)
}

function fromZod(error: z.ZodError): Refusal {
  const [first, ...rest] = error.issues
  const path = first?.path.join('.') ?? ''
  const more = rest.length === 0 ? '' : ` (and ${rest.length} more)`
  return new Refusal(422, 'invalid-request', `${path === '' ? 'request' : path}: ${first?.message}${more}`, {
    path,
  })
}

function fromMulter(error: MulterError): Refusal {
  if (error.code === 'LIMIT_FILE_SIZE') {
    return new Refusal(413, 'too-large', `A file may have at most ${uploadLimitBytes / 1e6} MB.`, {
      path: 'file',
    })
  }
  return new Refusal(422, 'invalid-upload', `Send one file in the field "file" (${error.message}).`, {
    path: error.field ?? 'file',
  })
}

/** Express's body parser throws errors that carry a `type` and a status. */
function fromBodyParser(error: unknown): Refusal | null {
  if (!(error instanceof Error) || !('type' in error) || !('status' in error)) return null
  if (error.type === 'entity.too.large' && 'limit' in error) {
    return new Refusal(
      413,
      'too-large',
      `The request has more than the allowed ${Number(error.limit)} bytes.`,
    )
  }
  if (error.type === 'entity.parse.failed') {
    return new Refusal(400, 'not-json', `The request is not valid JSON: ${error.message}`)
  }
  if (typeof error.status === 'number' && error.status >= 400 && error.status < 500) {
    return new Refusal(error.status, 'bad-request', error.message)
  }
  return null
}

/** A full disk is neither the caller's mistake nor a bug: it passes. */
function fromStorage(error: unknown): Refusal | null {
  const trouble = storageTrouble(error)
  return trouble && new Refusal(503, trouble.code, requestWords[trouble.code])
}

const requestWords: Record<StorageTrouble['code'], string> = {
  'storage-full': 'The disk of the server is full: nothing can be saved. What was saved before is safe.',
  'storage-busy': 'Another program keeps the database locked: nothing can be saved just now. Try again.',
  'storage-failed': 'The database cannot be written just now: nothing can be saved. Try again later.',
}
