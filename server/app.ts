import { randomUUID } from 'node:crypto';
import express, { Router, type Express, type RequestHandler } from 'express';
import helmet from 'helmet';
import type { Logger } from 'pino';
import type { Pools } from './db/pools.ts';
import { checkPassword } from './features/accounts/service.ts';
import { readLastBeat } from './features/clinic/worker-health.ts';
import { clientFiles } from './http/client-files.ts';
import { gatewayHooks, type HookTokens } from './http/gateway-hooks.ts';
import { healthRouter } from './http/health.ts';
import { mount } from './http/mount.ts';
import type { Site } from './http/site.ts';
import { openApiDocument } from './http/openapi.ts';
import { outboxRouter } from './http/outbox.ts';
import { configurePassport } from './http/passport.ts';
import { answerProblems, unknownApiPath } from './http/problem-answers.ts';
import { sessionMiddleware } from './http/sessions.ts';
import { allRoutes } from './routes.ts';

export type AppOptions = {
  pools: Pools;
  clock: () => Date;
  log: Logger;
  publicUrl: string;
  trustProxy?: string;
  sessionSecret: string;
  tokenSecret: string;
  sealSecret: string;
  vapidPublicKey: string;
  buildId: string;
  clientDir?: string | undefined;
  outboxUrl?: string | undefined;
  hookTokens?: HookTokens;
  demoAuthenticators?: readonly { name: string; secret: string }[];
};

const bodyLimit = '512kb';

const requestLog =
  (log: Logger): RequestHandler =>
  (req, res, next) => {
    const startedAt = performance.now();
    const requestId = randomUUID();
    res.locals.requestId = requestId;
    res.setHeader('x-request-id', requestId);
    res.on('finish', () => {
      // The route's pattern, never the address: addresses carry ids, and could carry more.
      const route = (req.route as { path?: string } | undefined)?.path ?? 'page';
      log.info({
        requestId,
        method: req.method,
        route,
        status: res.statusCode,
        ms: Math.round(performance.now() - startedAt),
      });
    });
    next();
  };

const securityHeaders = (secure: boolean): RequestHandler =>
  helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        'default-src': ["'self'"],
        'script-src': ["'self'"],
        'style-src-elem': ["'self'", "'unsafe-inline'"],
        'style-src-attr': ["'none'"],
        'img-src': ["'self'", 'blob:', 'data:'],
        'object-src': ["'none'"],
        'base-uri': ["'self'"],
        'form-action': ["'self'"],
        'frame-ancestors': ["'none'"],
        ...(secure ? { 'upgrade-insecure-requests': [] } : {}),
      },
    },
    strictTransportSecurity: secure,
    referrerPolicy: { policy: 'no-referrer' },
  });

/** What both HTTP and sockets need to know who asks. */
export type Identity = { session: RequestHandler; initialize: RequestHandler; restore: RequestHandler };

/** The web's Express application, and the middleware by which sockets find the same session. */
export const createApp = (options: AppOptions): { app: Express; identity: Identity } => {
  const { pools, clock, log, publicUrl, sessionSecret } = options;
  const { origin, protocol } = new URL(publicUrl);
  const secure = protocol === 'https:';
  const lastBeat = () => readLastBeat(pools.gate);
  const authenticator = configurePassport(pools, clock, (email, password, from) =>
    checkPassword(pools.gate, { email, password, from }, clock()),
  );
  const keys = { gate: pools.gate, secret: sessionSecret, authenticator };
  const identity: Identity = {
    session: sessionMiddleware(keys, { secureCookie: secure, log }),
    initialize: authenticator.initialize() as RequestHandler,
    restore: authenticator.session() as RequestHandler,
  };
  const routes = allRoutes(lastBeat);

  const app = express();
  app.disable('x-powered-by');
  if (options.trustProxy) {
    // A number of proxies must be one: Express takes the text of a number for an address.
    const { trustProxy } = options;
    app.set('trust proxy', /^\d+$/.test(trustProxy) ? Number(trustProxy) : trustProxy);
  }
  app.use(requestLog(log), securityHeaders(secure));
  app.use(
    healthRouter(
      async () => {
        await pools.app.query('select 1');
      },
      lastBeat,
      clock,
    ),
  );

  const api = Router();
  api.use((_req, res, next) => {
    res.setHeader('x-espalier-build', options.buildId);
    res.setHeader('cache-control', 'no-store');
    next();
  });
  api.get('/api/openapi.json', (_req, res) => {
    res.json(openApiDocument(routes));
  });
  api.use(express.json({ limit: bodyLimit }), identity.session, identity.initialize, identity.restore);
  const site: Site = {
    gate: pools.gate,
    publicUrl: publicUrl.replace(/\/+$/, ''),
    tokenSecret: options.tokenSecret,
    sealSecret: options.sealSecret,
    vapidPublicKey: options.vapidPublicKey,
  };
  mount(api, routes, { pools, keys, clock, publicOrigin: origin, site });
  api.use('/api', unknownApiPath);

  app.use((req, res, next) => (req.path.startsWith('/api/') ? api(req, res, next) : next()));
  app.use(gatewayHooks({ pools, clock, publicUrl, tokens: options.hookTokens ?? {} }));
  if (options.outboxUrl) {
    const authenticators = options.demoAuthenticators ?? [];
    app.use(outboxRouter({ fakesUrl: options.outboxUrl, publicOrigin: origin, authenticators, clock }));
  }
  if (options.clientDir) app.use(clientFiles(options.clientDir));
  app.use(answerProblems(log));
  return { app, identity };
};
