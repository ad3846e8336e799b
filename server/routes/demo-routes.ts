import { Router } from 'express';

import type { Dependencies } from '../dependencies';
import { refuseNotFound } from '../errors';
import { DEMO_PEOPLE } from '../seeds/demo';

/** Exists only with DEMO=1: invented people to sign in as, and the mail that went nowhere. */
export function demoRoutes({ mailbox }: Dependencies): Router {
  const router = Router();
  router.get('/demo/accounts', (_request, response) => {
    response.json({
      accounts: DEMO_PEOPLE.map(({ name, email, password, role }) => ({ name, email, password, role })),
    });
  });
  router.get('/demo/mail', async (_request, response) => {
    const messages = (await mailbox?.list()) ?? [];
    response.json({
      messages: messages.map(({ id, to, subject, receivedAt }) => ({
        id,
        to,
        subject,
        receivedAt: receivedAt.toISOString(),
      })),
    });
  });
  router.get('/demo/mail/:id', async (request, response) => {
    const message = await mailbox?.read(String(request.params.id));
    if (!message) throw refuseNotFound('There is no such message.');
    response.json({ ...message, receivedAt: message.receivedAt.toISOString() });
  });
  return router;
}
