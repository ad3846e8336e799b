import { Router } from 'express';

import type { Dependencies } from '../dependencies';
import { Refusal } from '../errors';

export function healthRoutes({ database, isReady }: Dependencies): Router {
  const router = Router();
  router.get('/health', (_request, response) => void response.json({ alive: true }));
  router.get('/ready', async (_request, response) => {
    const answers =
      isReady() &&
      (await database.sequelize.query('SELECT 1').then(
        () => true,
        () => false,
      ));
    if (!answers) throw new Refusal(503, 'unavailable', 'The server is starting or stopping.');
    response.json({ ready: true });
  });
  return router;
}
