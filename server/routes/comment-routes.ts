import { Router, type Request } from 'express';

import { activityQuerySchema } from '@/contract/activity';
import {
  commentQuerySchema,
  editCommentSchema,
  resolveThreadSchema,
  writeCommentSchema,
} from '@/contract/comments';

import { listActivity } from '../commands/comments/activity';
import { listComments, readThread } from '../commands/comments/read';
import { commentersOn } from '../commands/comments/readers';
import { deleteComment, editComment, resolveThread, writeComment } from '../commands/comments/write';
import { findPreset } from '../commands/find-preset';
import type { Dependencies } from '../dependencies';
import { requireSignedIn, signedIn } from '../middleware/current-user';
import { parseBody, parseQuery } from '../middleware/parse';
import { demand } from '../policies/preset-policy';

const presetId = (request: Request) => String(request.params.id);
const commentId = (request: Request) => String(request.params.commentId);

/** Comments on presets, and what was done to a preset. */
export function commentRoutes(dependencies: Dependencies): Router {
  const router = Router();
  router.use('/presets', requireSignedIn);

  const seen = async (request: Request, right: 'view' | 'comment') => {
    const preset = await findPreset(dependencies, presetId(request));
    demand(signedIn(request), right, preset);
    return preset;
  };
  const thread = async (request: Request, id: string) =>
    readThread(dependencies, signedIn(request), await seen(request, 'comment'), id);

  router.get('/presets/:id/activity', async (request, response) => {
    const preset = await seen(request, 'view');
    const { page } = parseQuery(request, activityQuerySchema);
    response.json(await listActivity(dependencies.database, preset.id, page));
  });

  router.get('/presets/:id/comments', async (request, response) => {
    const preset = await seen(request, 'view');
    const query = parseQuery(request, commentQuerySchema);
    response.json(await listComments(dependencies, signedIn(request), preset, query));
  });

  router.get('/presets/:id/comments/people', async (request, response) => {
    const people = await commentersOn(dependencies, await seen(request, 'comment'));
    response.json({ people: people.map(({ id, name }) => ({ id, name })) });
  });

  router.post('/presets/:id/comments', async (request, response) => {
    await seen(request, 'comment');
    const body = parseBody(request, writeCommentSchema);
    const id = await writeComment(dependencies, signedIn(request), presetId(request), body);
    response.status(201).json(await thread(request, id));
  });

  router.patch('/presets/:id/comments/:commentId', async (request, response) => {
    await seen(request, 'comment');
    const body = parseBody(request, editCommentSchema);
    const person = signedIn(request);
    const id = await editComment(dependencies, person, presetId(request), commentId(request), body);
    response.json(await thread(request, id));
  });

  router.delete('/presets/:id/comments/:commentId', async (request, response) => {
    await deleteComment(dependencies, signedIn(request), presetId(request), commentId(request));
    response.status(204).end();
  });

  router.put('/presets/:id/comments/:commentId/resolved', async (request, response) => {
    await seen(request, 'comment');
    const { resolved } = parseBody(request, resolveThreadSchema);
    const person = signedIn(request);
    const id = await resolveThread(dependencies, person, presetId(request), commentId(request), resolved);
    response.json(await thread(request, id));
  });

  return router;
}
