import { randomUUID } from 'node:crypto'
import type { RequestHandler } from 'express'
import { pino, type Logger } from 'pino'
import { pinoHttp } from 'pino-http'

/** Structured lines on standard output. Only bugs are logged as errors. */
export function createLog(level: string): Logger {
  return pino({
    level,
    base: null,
    timestamp: pino.stdTimeFunctions.isoTime,
    redact: ['req.headers.cookie', 'req.headers.authorization', 'res.headers["set-cookie"]'],
  })
}

/** Ordinary requests are logged at "debug"; a failed one has been logged by the error handler with its cause. */
export function requestLog(log: Logger): RequestHandler {
  return pinoHttp({
    logger: log,
    genReqId: () => randomUUID(),
    customLogLevel: () => 'debug',
    serializers: {
      req: ({ id, method, url }: { id: string; method: string; url: string }) => ({ id, method, url }),
      res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
    },
  })
}
