import { Router } from 'express';

import type { Dependencies } from '../dependencies';
import { Refusal } from '../errors';

/** Asked by what runs the server. Before it is open, and once it stops, the front door answers instead. */
export function healthRoutes({ database }: Dependencies): Router {
  const router = Router();
  router.get('/health', (_request, response) => void response.json({ alive: true }));
  router.get('/ready', async (_request, response) => {
    const answers = await database.sequelize.query('SELECT 1 FROM schema_migrations LIMIT 1').then(
      () => true,
      () => false,
    );
    if (!answers) throw new Refusal(503, 'unavailable', 'The database does not answer.');
    response.json({ ready: true });
  });
  return router;
}
