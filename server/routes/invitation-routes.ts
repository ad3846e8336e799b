import { Router, type Request } from 'express';

import { signUpByInvitationSchema } from '@/contract/labs';

import {
  acceptInvitation,
  answerOwnInvitation,
  askToConfirmAddress,
  declineInvitation,
  findInvitation,
  isFor,
  listOwnInvitations,
  signUpByInvitation,
} from '../commands/joining';
import type { Dependencies } from '../dependencies';
import { readPerson, requireSignedIn, signedIn, visitorOrPerson } from '../middleware/current-user';
import { issueCsrfToken } from '../middleware/forgery';
import { parseBody } from '../middleware/parse';
import { beginSession } from '../middleware/sessions';
import { presentInvitation, presentOwnInvitations } from '../presenters/present-lab';
import { presentSession } from '../presenters/present-session';

const token = (request: Request) => String(request.params.token);
const id = (request: Request) => String(request.params.id);

/** Answers to invitations: by the mailed link, or by the person whose address it went to. */
export function invitationRoutes(dependencies: Dependencies): Router {
  const { database, settings, limits } = dependencies;
  const router = Router();
  router.use('/invitations', limits.secrets);

  router.get('/invitations/:token', async (request, response) => {
    const open = await findInvitation(dependencies, token(request));
    const person = visitorOrPerson(request);
    response.json(presentInvitation(open.invitation, person !== null && isFor(open, person)));
  });

  router.post('/invitations/:token/accept', requireSignedIn, async (request, response) => {
    response.json({ labId: await acceptInvitation(dependencies, signedIn(request), token(request)) });
  });

  router.post('/invitations/:token/confirm-address', requireSignedIn, async (request, response) => {
    await askToConfirmAddress(dependencies, signedIn(request), token(request));
    response.status(202).json({ accepted: true });
  });

  router.post('/invitations/:token/decline', async (request, response) => {
    await declineInvitation(dependencies, visitorOrPerson(request), token(request));
    response.status(204).end();
  });

  router.post('/invitations/:token/sign-up', async (request, response) => {
    const body = parseBody(request, signUpByInvitationSchema);
    const user = await signUpByInvitation(dependencies, token(request), body);
    await beginSession(request, user.id);
    const person = await readPerson(dependencies, user.id);
    const csrfToken = issueCsrfToken(request, response, settings);
    response.status(201).json(presentSession(person, csrfToken, settings.demo));
  });

  router.get('/account/invitations', requireSignedIn, async (request, response) => {
    response.json(presentOwnInvitations(await listOwnInvitations(database, signedIn(request))));
  });

  router.post('/account/invitations/:id/accept', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    response.json({ labId: await answerOwnInvitation(dependencies, person, id(request), 'accept') });
  });

  router.post('/account/invitations/:id/decline', requireSignedIn, async (request, response) => {
    await answerOwnInvitation(dependencies, signedIn(request), id(request), 'decline');
    response.status(204).end();
  });

  return router;
}
