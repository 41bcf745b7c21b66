import { existsSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import express, { type Express } from 'express'
import { precompressed } from './precompressed.ts'

/** Where the built client lies, seen from source (server/http) and from the build (dist/node/server/http). */
export function findClientFolder(): string | null {
  for (const place of ['../../../client/', '../../dist/client/']) {
    const folder = fileURLToPath(new URL(place, import.meta.url))
    if (existsSync(`${folder}index.html`)) return folder
  }
  return null
}

/**
 * Serves the client: files named by their content for ever, the page itself always fresh, and the page for every
 * address that the client's router knows.
 */
export function serveClient(app: Express, folder: string | null): void {
  if (folder === null) {
    app.get('/{*path}', (_request, response) => {
      response.status(404).type('text/plain').send('The client has not been built: run "npm run build".\n')
    })
    return
  }
  app.use(
    '/assets',
    precompressed(`${folder}assets`),
    express.static(`${folder}assets`, { immutable: true, maxAge: '1y', fallthrough: false }),
  )
  app.use(express.static(folder, { index: false, maxAge: '1h' }))
  app.get('/{*path}', (_request, response) => {
    response.set('Cache-Control', 'no-cache').sendFile('index.html', { root: folder })
  })
}
