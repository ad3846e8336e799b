import { Router, type Request } from 'express';

import {
  changeMailSettingsSchema,
  unsubscribeQuerySchema,
  type MailSettingsBody,
  type SubscriptionBody,
} from '@/contract/mail';

import type { Dependencies } from '../dependencies';
import {
  changeMailSettings,
  describeScope,
  kindsOf,
  readMailSettings,
  turnMail,
} from '../mail/mail-settings';
import { readUnsubscribeToken, type Subscription } from '../mail/unsubscribe-token';
import { requireSignedIn, signedIn } from '../middleware/current-user';
import { parseBody, parseQuery } from '../middleware/parse';

function present({ address, scope }: Subscription, { timings }: MailSettingsBody): SubscriptionBody {
  return {
    address,
    label: describeScope(scope),
    off: kindsOf(scope).every((kind) => timings[kind] === 'off'),
  };
}

/**
 * Where the links of messages lead. Mail programs post here on behalf of their readers, with neither cookie nor
 * page: the signed token is the whole authority, and it can do nothing else.
 */
export function unsubscribeRoutes({ database, settings, limits }: Dependencies): Router {
  const router = Router();
  const subscriptionOf = (request: Request) =>
    readUnsubscribeToken(parseQuery(request, unsubscribeQuerySchema).token, settings.sessionSecret);

  router.get('/mail/subscription', limits.secrets, async (request, response) => {
    const subscription = subscriptionOf(request);
    response.json(present(subscription, await readMailSettings(database, subscription.address)));
  });
  // A visit changes nothing: scanners of mail visit links too. It leads to the page that asks.
  router.get('/mail/unsubscribe', (request, response) => {
    const { token } = parseQuery(request, unsubscribeQuerySchema);
    response.redirect(303, `${settings.publicUrl}/unsubscribe?token=${encodeURIComponent(token)}`);
  });
  for (const [path, off] of [
    ['/mail/unsubscribe', true],
    ['/mail/subscribe-again', false],
  ] as const) {
    router.post(path, limits.secrets, async (request, response) => {
      const subscription = subscriptionOf(request);
      const { address, scope } = subscription;
      response.json(present(subscription, await turnMail(database, address, scope, off)));
    });
  }
  return router;
}

/** What is mailed to the person signed in. */
export function mailSettingsRoutes({ database }: Dependencies): Router {
  const router = Router();
  router.get('/account/mail', requireSignedIn, async (request, response) => {
    response.json(await readMailSettings(database, signedIn(request).email));
  });
  router.patch('/account/mail', requireSignedIn, async (request, response) => {
    const change = parseBody(request, changeMailSettingsSchema);
    response.json(await changeMailSettings(database, signedIn(request).email, change));
  });
  return router;
}
