import type { Express } from 'express'

interface Layer {
  readonly route?: { readonly path: unknown; readonly stack: readonly { readonly method: string }[] }
  readonly handle: { readonly stack?: unknown }
}

/**
 * All routes of an application as "METHOD /path", read off its router. A nested router hides its mount path, so
 * one is an error: routes are to be registered flat.
 */
export function listRoutes(app: Express): string[] {
  const { stack } = app.router as unknown as { readonly stack: readonly Layer[] }
  const found = new Set<string>()
  for (const { route, handle } of stack) {
    if (!route) {
      if (handle.stack !== undefined) throw new Error('A nested router: its routes cannot be listed.')
      continue
    }
    if (typeof route.path !== 'string')
      throw new Error(`A route whose path is no text: ${String(route.path)}`)
    for (const { method } of route.stack) found.add(`${method.toUpperCase()} ${route.path}`)
  }
  return [...found]
}
