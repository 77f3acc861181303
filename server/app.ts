/** The Express application: what passes before every route, the routes, the built client behind them. */
import compression from 'compression';
import express, { type Express, type RequestHandler } from 'express';
import helmet from 'helmet';
import { pinoHttp } from 'pino-http';
import { API_PREFIX } from '@/shared/contracts/common';
import type { Config } from './config';
import type { Context } from './context';
import { serveClient } from './client-files';
import { refuseCrossSite } from './middleware/cross-site';
import { answerProblems, noRoute } from './middleware/problems';
import type { Sessions } from './middleware/session';
import { ROUTES } from './routes';
import { handlersOf } from './routes/chain';

const LARGEST_JSON = '4mb';

export function createApp(ctx: Context, sessions: Sessions): Express {
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', ctx.config.trustProxy);
  app.set('query parser', 'simple');
  app.use(securityHeaders(ctx.config), compression(), requestLog(ctx));
  app.use(API_PREFIX, createApi(ctx, sessions));
  app.use(serveClient(ctx.config.clientDir));
  app.use(answerProblems);
  return app;
}

function createApi(ctx: Context, sessions: Sessions) {
  const api = express.Router();
  api.use(fresh, refuseCrossSite(ctx.config), express.json({ limit: LARGEST_JSON }));
  for (const route of ROUTES) {
    const session = route.path === '/health' ? [] : [sessions.middleware];
    api[route.method](route.path, ...session, ...handlersOf(ctx, route));
  }
  api.use(noRoute, answerProblems);
  return api;
}

/** Answers may be kept by the browser, but never shown without asking whether they still hold (ETag). */
const fresh: RequestHandler = (_req, res, next) => {
  res.setHeader('Cache-Control', 'private, no-cache');
  next();
};

/** The client's bundle loads from here alone; React Native Web writes its styles into the page. */
function securityHeaders(config: Config): RequestHandler {
  const overTls = config.publicUrl?.startsWith('https:') ?? false;
  return helmet({
    strictTransportSecurity: overTls,
    contentSecurityPolicy: {
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'"],
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'", 'data:'],
        connectSrc: ["'self'"],
        objectSrc: ["'none'"],
        frameAncestors: ["'none'"],
        upgradeInsecureRequests: overTls ? [] : null,
      },
    },
  });
}

/** One line a request of the API, without cookies or bodies. */
const requestLog = (ctx: Context): RequestHandler =>
  pinoHttp({
    logger: ctx.log,
    autoLogging: { ignore: (req) => !req.url?.startsWith(API_PREFIX) || req.url === `${API_PREFIX}/health` },
    customLogLevel: (_req, res) => (res.statusCode >= 500 ? 'warn' : 'info'),
    customErrorObject: (_req, _res, _error, line: object) => ({ ...line, err: undefined }), // logged where it was caught
    serializers: {
      req: (req: { method: string; url: string }) => ({ method: req.method, url: withoutToken(req.url) }),
      res: (res: { statusCode: number }) => ({ status: res.statusCode }),
    },
  });

/** A token in a path is worth an account: it does not go into the log. */
const withoutToken = (url: string) => url.replace(/(\/invitations\/)[^/?]+/, '$1…');
