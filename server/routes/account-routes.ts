import { Router, type Request, type Response } from 'express';

import {
  changeAccountSchema,
  changePasswordSchema,
  confirmAccountSchema,
  forgottenPasswordSchema,
  resetPasswordSchema,
  signInSchema,
  signUpSchema,
} from '@/contract/account';
import { deleteAccountSchema } from '@/contract/account-deletion';

import {
  changePassword,
  checkPassword,
  confirmAccount,
  requestAccount,
  requestReset,
  resetPassword,
} from '../commands/account-commands';
import { deleteAccount, describeDeletion } from '../commands/account-deletion';
import type { Dependencies } from '../dependencies';
import { refuseNotFound, refuseNotSignedIn } from '../errors';
import { readPerson, requireSignedIn, signedIn, visitorOrPerson } from '../middleware/current-user';
import { issueCsrfToken } from '../middleware/forgery';
import { parseBody } from '../middleware/parse';
import { beginSession, endSession, SESSION_COOKIE } from '../middleware/sessions';
import { presentSession, presentSessionList } from '../presenters/present-session';

export function accountRoutes(dependencies: Dependencies): Router {
  const { database, settings, limits } = dependencies;
  const router = Router();

  const answerSession = async (request: Request, response: Response, status = 200, userId?: string) => {
    const person = userId === undefined ? visitorOrPerson(request) : await readPerson(dependencies, userId);
    response
      .status(status)
      .json(presentSession(person, issueCsrfToken(request, response, settings), settings.demo));
  };

  router.get('/session', (request, response) => answerSession(request, response));

  router.post('/session', limits.signIn, async (request, response) => {
    const user = await checkPassword(dependencies, parseBody(request, signInSchema));
    if (user === null) throw refuseNotSignedIn('The e-mail address or the password is not right. Try again.');
    await beginSession(request, user.id);
    await answerSession(request, response, 200, user.id);
  });

  router.delete('/session', requireSignedIn, async (request, response) => {
    await endSession(request);
    response.clearCookie(SESSION_COOKIE, { path: '/' });
    response.status(204).end();
  });

  router.post('/accounts', limits.signUp, async (request, response) => {
    await requestAccount(dependencies, parseBody(request, signUpSchema));
    response.status(202).json({ accepted: true });
  });

  router.post('/accounts/confirm', limits.secrets, async (request, response) => {
    const user = await confirmAccount(dependencies, parseBody(request, confirmAccountSchema).token);
    await beginSession(request, user.id);
    await answerSession(request, response, 201, user.id);
  });

  router.post('/password/forgotten', limits.mail, async (request, response) => {
    await requestReset(dependencies, parseBody(request, forgottenPasswordSchema).email);
    response.status(202).json({ accepted: true });
  });

  router.post('/password/reset', limits.secrets, async (request, response) => {
    await resetPassword(dependencies, parseBody(request, resetPasswordSchema));
    response.status(204).end();
  });

  router.post('/password/change', requireSignedIn, limits.secrets, async (request, response) => {
    const { id } = signedIn(request);
    await changePassword(dependencies, id, parseBody(request, changePasswordSchema));
    await beginSession(request, id);
    await answerSession(request, response, 200, id);
  });

  router.patch('/account', requireSignedIn, async (request, response) => {
    const { id } = signedIn(request);
    const { name } = parseBody(request, changeAccountSchema);
    await database.write(() => database.models.User.update({ name }, { where: { id } }));
    await answerSession(request, response, 200, id);
  });

  router.get('/account/sessions', requireSignedIn, async (request, response) => {
    const records = await database.models.SessionRecord.findAll({
      where: { userId: signedIn(request).id },
      order: [['lastSeenAt', 'DESC']],
    });
    const current = records.filter((record) => record.expires > new Date());
    response.json(presentSessionList(current, request.session.publicId ?? ''));
  });

  router.delete('/account/sessions', requireSignedIn, async (request, response) => {
    const { id } = signedIn(request);
    const keep = request.session.publicId ?? '';
    await database.write(() =>
      database.sequelize.query('DELETE FROM sessions WHERE userId = ? AND publicId <> ?', {
        replacements: [id, keep],
      }),
    );
    response.status(204).end();
  });

  router.delete('/account/sessions/:id', requireSignedIn, async (request, response) => {
    const { id } = signedIn(request);
    const ended = await database.write(() =>
      database.models.SessionRecord.destroy({ where: { userId: id, publicId: String(request.params.id) } }),
    );
    if (ended === 0) throw refuseNotFound('You have no such session; it may have ended already.');
    response.status(204).end();
  });

  router.get('/account/deletion', requireSignedIn, async (request, response) => {
    response.json(await describeDeletion(dependencies, signedIn(request)));
  });

  router.post('/account/deletion', requireSignedIn, limits.secrets, async (request, response) => {
    await deleteAccount(dependencies, signedIn(request), parseBody(request, deleteAccountSchema));
    response.clearCookie(SESSION_COOKIE, { path: '/' });
    response.status(204).end();
  });

  return router;
}
