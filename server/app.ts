import { existsSync } from 'node:fs';
import { join } from 'node:path';

import express, { Router, type Express } from 'express';
import { pinoHttp } from 'pino-http';

import type { Dependencies } from './dependencies';
import { makeId } from './ids';
import { concealTokens, describeError } from './logger';
import { findPerson } from './middleware/current-user';
import { answerErrors, refuseUnknownRoute } from './middleware/errors';
import { refuseForgeries } from './middleware/forgery';
import { securityHeaders } from './middleware/security-headers';
import { createSessions } from './middleware/sessions';
import { refuseUnsound } from './middleware/sound-text';
import { accountRoutes } from './routes/account-routes';
import { assignedRoutes } from './routes/assigned-routes';
import { auditRoutes } from './routes/audit-routes';
import { commentRoutes } from './routes/comment-routes';
import { demoRoutes } from './routes/demo-routes';
import { exportRoutes } from './routes/export-routes';
import { healthRoutes } from './routes/health-routes';
import { invitationRoutes } from './routes/invitation-routes';
import { labRoutes } from './routes/lab-routes';
import { mailSettingsRoutes, unsubscribeRoutes } from './routes/mail-routes';
import { presetRoutes } from './routes/preset-routes';
import { sharedRoutes } from './routes/shared-routes';

const LARGEST_BODY = '1mb';
/** A hand-in holds a document and a kept sweep. */
const LARGEST_HAND_IN = '2mb';
const A_YEAR = 365 * 24 * 60 * 60_000;

function apiRouter(dependencies: Dependencies): Router {
  const { database, settings } = dependencies;
  const router = Router();
  router.use((_request, response, next) => {
    response.set('cache-control', 'no-store');
    next();
  });
  router.use(healthRoutes(dependencies), unsubscribeRoutes(dependencies));
  router.use(createSessions(database, settings), refuseForgeries(settings));
  router.use('/assigned/:id/hand-ins', express.json({ limit: LARGEST_HAND_IN, strict: true }));
  router.use(express.json({ limit: LARGEST_BODY, strict: true }), refuseUnsound, findPerson(dependencies));
  router.use(
    accountRoutes(dependencies),
    labRoutes(dependencies),
    auditRoutes(dependencies),
    exportRoutes(dependencies),
    invitationRoutes(dependencies),
    mailSettingsRoutes(dependencies),
    presetRoutes(dependencies),
    commentRoutes(dependencies),
    sharedRoutes(dependencies),
    assignedRoutes(dependencies),
  );
  if (settings.demo) router.use(demoRoutes(dependencies));
  router.use(refuseUnknownRoute);
  return router;
}

/** The built client: hashed files for a year, the page itself never from a cache. */
function clientRouter(folder: string): Router {
  const router = Router();
  router.use(
    '/assets',
    express.static(join(folder, 'assets'), { immutable: true, maxAge: A_YEAR, fallthrough: false }),
  );
  router.use(express.static(folder, { index: false, maxAge: 0 }));
  router.get('/{*splat}', (_request, response) => {
    // With a root, so that a folder above it may begin with a dot.
    response.set('cache-control', 'no-cache').sendFile('index.html', { root: folder });
  });
  return router;
}

/** The application; it never listens by itself. */
export function createApp(dependencies: Dependencies): Express {
  const { settings, logger } = dependencies;
  const app = express();
  app.disable('x-powered-by');
  // Answers of the interface are never kept, so that nothing is gained by naming their state.
  app.disable('etag');
  app.set('trust proxy', settings.trustProxy);
  app.set('query parser', 'simple');
  app.use(
    pinoHttp({
      logger,
      genReqId: () => makeId(),
      serializers: {
        req: (request: { id: string; method: string; url: string }) => ({
          id: request.id,
          method: request.method,
          url: concealTokens(request.url),
        }),
        res: (response: { statusCode: number }) => ({ status: response.statusCode }),
        err: describeError,
      },
    }),
    securityHeaders(settings),
  );
  app.use('/api', apiRouter(dependencies));
  if (settings.clientFolder !== null && existsSync(settings.clientFolder))
    app.use(clientRouter(settings.clientFolder));
  app.use(answerErrors(logger));
  return app;
}
