import compression from 'compression';
import cookieParser from 'cookie-parser';
import express, { Router, type Express } from 'express';
import helmet from 'helmet';
import { existsSync } from 'node:fs';
import { pinoHttp } from 'pino-http';
import { randomUUID } from 'node:crypto';
import { refuseOtherSites } from './auth/same-site.ts';
import { cardRoutes } from './cards/routes.ts';
import { estimateRoutes } from './corner-plans/estimate-routes.ts';
import { cornerPlanRoutes } from './corner-plans/routes.ts';
import { AppError, errorHandler, notFound } from './errors.ts';
import { gradeRoutes } from './grades/routes.ts';
import { houseRuleRoutes } from './house-rules/routes.ts';
import { rateRoutes } from './rates/routes.ts';
import { layoutRoutes } from './layouts/routes.ts';
import { machineRoutes } from './machines/routes.ts';
import { nozzleRoutes } from './nozzles/routes.ts';
import { partRoutes } from './parts/routes.ts';
import { peopleRoutes } from './people/routes.ts';
import { plateRoutes } from './plates/routes.ts';
import { recordRoutes } from './record/routes.ts';
import { reportRoutes } from './reports/routes.ts';
import { requestRoutes } from './requests/routes.ts';
import { reviewRoutes } from './reviews/routes.ts';
import { revisionRoutes } from './revisions/routes.ts';
import { mountOn } from './route.ts';
import { serviceRoutes } from './service/routes.ts';
import type { Services } from './services.ts';
import { sessionRoutes } from './sessions/routes.ts';
import { inlineScriptHashes, webApp } from './static.ts';
import { strategyRoutes } from './strategies/routes.ts';
import { takeAwayRoutes } from './take-away/routes.ts';

/** Every route of the API on a router of its own, which a test can walk. */
export function apiRouter(services: Services): Router {
  const router = Router();
  const mount = mountOn(router, services);
  serviceRoutes(mount);
  sessionRoutes(mount);
  peopleRoutes(mount);
  machineRoutes(mount);
  nozzleRoutes(mount);
  gradeRoutes(mount);
  strategyRoutes(mount);
  revisionRoutes(mount);
  reviewRoutes(mount);
  houseRuleRoutes(mount);
  rateRoutes(mount);
  plateRoutes(mount);
  cardRoutes(mount);
  requestRoutes(mount);
  partRoutes(mount);
  layoutRoutes(mount);
  cornerPlanRoutes(mount);
  estimateRoutes(mount);
  takeAwayRoutes(mount);
  reportRoutes(mount);
  recordRoutes(mount);
  return router;
}

/** The product over HTTP. It does not listen: main.ts does, and tests call it as it is. */
export function createApp(services: Services): Express {
  const { log, secure, closing } = services;
  const web = services.webFolder !== null && existsSync(services.webFolder) ? services.webFolder : null;
  const app = express();
  app.disable('x-powered-by');
  // A row's version is the ETag; Express's own would hide a stale write behind equal bytes.
  app.set('etag', false);

  app.use(
    pinoHttp({
      logger: log,
      genReqId: () => randomUUID(),
      // No cookies, no bodies, no addresses: what was asked and how it went.
      serializers: {
        req: ({ id, method, url }: { id: string; method: string; url: string }) => ({
          id,
          method,
          url: url.split('?')[0],
        }),
        res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
      },
      customLogLevel: (_request, response, error) => (error || response.statusCode >= 500 ? 'error' : 'debug'),
    }),
  );
  app.use(securityHeaders(web, secure));
  app.use(compression());

  const api: express.RequestHandler = (_request, response, next) => {
    response.setHeader('Cache-Control', 'no-store');
    if (closing()) response.setHeader('Connection', 'close');
    next();
  };
  app.use('/api', api, refuseOtherSites, cookieParser());
  app.use(apiRouter(services));
  app.use('/api', (_request, _response, next) => next(notFound('The API has no such route')));

  if (web !== null) app.use(webApp(web));
  app.use((_request, _response, next) => next(new AppError('not-found', 'There is nothing at this address.')));
  app.use(errorHandler(log));
  return app;
}

function securityHeaders(web: string | null, secure: boolean): express.RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'", ...(web === null ? [] : inlineScriptHashes(web))],
        // The web app's styles are written into the page as it runs.
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'"],
        connectSrc: ["'self'"],
        workerSrc: ["'self'"],
        manifestSrc: ["'self'"],
        baseUri: ["'self'"],
        objectSrc: ["'none'"],
        frameAncestors: ["'none'"],
        formAction: ["'self'"],
      },
    },
    strictTransportSecurity: secure ? { maxAge: 31_536_000 } : false,
    referrerPolicy: { policy: 'same-origin' },
    xFrameOptions: { action: 'deny' },
  });
}
