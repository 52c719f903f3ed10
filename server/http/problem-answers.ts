import { randomUUID } from 'node:crypto';
import type { ErrorRequestHandler, RequestHandler } from 'express';
import type { Logger } from 'pino';
import { Problem, problems } from '#shared/problems/problems.ts';
import { framesOf } from '../log.ts';

/** What Express and its body parser throw at a request that is not right: an error with a 4xx status. */
const fromRequest = (error: unknown): Problem | null => {
  if (!(error instanceof Error) || !('status' in error)) return null;
  if (typeof error.status !== 'number' || error.status < 400 || error.status > 499) return null;
  if (!('type' in error)) return new Problem('malformed-request');
  if (error.type === 'entity.too.large') return new Problem('too-large');
  if (error.type === 'charset.unsupported' || error.type === 'encoding.unsupported') {
    return new Problem('unsupported-content');
  }
  return new Problem('malformed-request');
};

const unreachableCodes = new Set([
  ...['ECONNREFUSED', 'ECONNRESET', '57P01', '57P03', '53300'],
  // It took longer than a lock or a statement may, or was one of two that waited for each other.
  ...['55P03', '57014', '40P01'],
]);

/** The database could not be reached, is going away or is too busy: worth another try, and nothing was kept. */
const fromDatabase = (error: unknown): Problem | null => {
  for (let cause = error; cause instanceof Error; cause = cause.cause) {
    if ('code' in cause && typeof cause.code === 'string' && unreachableCodes.has(cause.code)) {
      return new Problem('unavailable');
    }
    if (cause.message === 'timeout exceeded when trying to connect') return new Problem('unavailable');
  }
  return null;
};

export const unknownApiPath: RequestHandler = (_req, _res, next) => {
  next(new Problem('not-found'));
};

/** Every refusal as `application/problem+json` (RFC 9457); what nobody expected, reported and answered bare. */
export const answerProblems =
  (log: Logger): ErrorRequestHandler =>
  (error: unknown, req, res, next) => {
    if (res.headersSent) {
      next(error);
      return;
    }
    const problem = (error instanceof Problem ? error : null) ?? fromRequest(error) ?? fromDatabase(error);
    if (problem) {
      if (problem.code === 'unavailable')
        log.warn({ requestId: res.locals.requestId }, 'the database is not reachable');
      if (problem.extra.retryAfter !== undefined) res.setHeader('retry-after', problem.extra.retryAfter);
      res.status(problem.status).type('application/problem+json').send(JSON.stringify(problem.toBody()));
      return;
    }
    const reportId = randomUUID();
    // Drizzle puts the values of a query into its message: the report keeps the kind of error and its place.
    log.error(
      { reportId, requestId: res.locals.requestId, method: req.method, fault: faultOf(error) },
      'unexpected',
    );
    const body = new Problem('internal', undefined, { reportId }).toBody();
    res.status(problems.internal.status).type('application/problem+json').send(JSON.stringify(body));
  };

const faultOf = (error: unknown): Record<string, unknown> => {
  if (!(error instanceof Error)) return { name: typeof error };
  const cause = error.cause instanceof Error ? error.cause : null;
  return {
    name: error.name,
    stack: framesOf(error),
    code: cause && 'code' in cause ? cause.code : undefined,
    constraint: cause && 'constraint' in cause ? cause.constraint : undefined,
    cause: cause?.name,
  };
};
