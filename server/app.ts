import express, { type Express } from 'express'
import helmet from 'helmet'
import type session from 'express-session'
import { sessionSecret } from './config.ts'
import type { ServerContext } from './context.ts'
import { answerProblem } from './http/answerProblem.ts'
import { findClientFolder, serveClient } from './http/clientFiles.ts'
import { noSuchRoute } from './http/endpoint.ts'
import { ownOrigin } from './http/ownOrigin.ts'
import { sessionCookie } from './http/sessions.ts'
import { requestLog } from './logging.ts'
import { campaignRoutes } from './routes/campaigns.ts'
import { candidateRoutes } from './routes/candidates.ts'
import { certificateRoutes } from './routes/certificates.ts'
import { collectionRoutes } from './routes/collections.ts'
import { commentRoutes } from './routes/comments.ts'
import { explorationRoutes } from './routes/explorations.ts'
import { eventRoutes } from './routes/events.ts'
import { externalTableRoutes } from './routes/externalTables.ts'
import { healthRoutes } from './routes/health.ts'
import { importedCandidateRoutes } from './routes/importedCandidates.ts'
import { polytopeRoutes } from './routes/polytopes.ts'
import { comparisonRoutes } from './routes/comparisons.ts'
import { rescoringRoutes } from './routes/rescorings.ts'
import { reviewingRoutes } from './routes/reviewing.ts'
import { searchRoutes } from './routes/searches.ts'
import { searchRunningRoutes } from './routes/searchRunning.ts'
import { sessionRoutes } from './routes/session.ts'
import { shortlistRoutes } from './routes/shortlists.ts'
import { targetRoutes } from './routes/targets.ts'
import { verdictRoutes } from './routes/verdicts.ts'

/**
 * The Express application, built from its dependencies. Every route of the API is registered flat, under its full
 * path, so that a test can list them.
 */
export function buildApp(context: ServerContext, sessions: session.Store): Express {
  const { config, log } = context
  const app = express()
  app.disable('x-powered-by')
  app.set('trust proxy', config.trustProxy)
  app.use(requestLog(log))
  app.use(securityHeaders(config.baseUrl.startsWith('https:')))
  app.use('/api', (_request, response, next) => {
    response.set('Cache-Control', 'no-store')
    next()
  })
  app.use('/api', ownOrigin(config.baseUrl))
  app.use('/api', sessionCookie(config, sessions, sessionSecret(config)))

  healthRoutes(app, context)
  sessionRoutes(app, context)
  campaignRoutes(app, context)
  polytopeRoutes(app, context)
  collectionRoutes(app, context)
  targetRoutes(app, context)
  explorationRoutes(app, context)
  searchRoutes(app, context)
  searchRunningRoutes(app, context)
  comparisonRoutes(app, context)
  shortlistRoutes(app, context)
  rescoringRoutes(app, context)
  externalTableRoutes(app, context)
  candidateRoutes(app, context)
  verdictRoutes(app, context)
  commentRoutes(app, context)
  reviewingRoutes(app, context)
  certificateRoutes(app, context)
  importedCandidateRoutes(app, context)
  eventRoutes(app, context)

  app.use('/api', noSuchRoute)
  serveClient(app, findClientFolder())
  app.use(answerProblem)
  return app
}

/**
 * Scripts only from ourselves. Styles also inline: the rule editor (CodeMirror) writes its themes into style
 * elements, and typeset formulas (KaTeX) place their parts by style attributes.
 */
function securityHeaders(https: boolean) {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'"],
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'", 'data:'],
        connectSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        ...(https ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: https,
    crossOriginEmbedderPolicy: false,
    referrerPolicy: { policy: 'same-origin' },
  })
}
