import { existsSync, readdirSync } from 'node:fs'
import { type RequestHandler } from 'express'

const smallerFirst = [
  ['br', '.br'],
  ['gzip', '.gz'],
] as const

/**
 * Points a request for a file at the smaller one that the build put beside it, where the browser takes that encoding.
 * Only names that were in the folder at the start are ever asked for.
 */
export function precompressed(folder: string): RequestHandler {
  const files = new Set(existsSync(folder) ? readdirSync(folder) : [])
  return (request, response, next) => {
    response.vary('Accept-Encoding')
    const name = request.path.slice(1)
    const found = smallerFirst.find(
      ([encoding, ending]) => files.has(name + ending) && request.acceptsEncodings(encoding),
    )
    if (found) {
      const [encoding, ending] = found
      response.set('Content-Encoding', encoding).type(name.slice(name.lastIndexOf('.')))
      request.url = `/${name}${ending}`
    }
    next()
  }
}
