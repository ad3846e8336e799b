import { Router, type Request } from 'express';

import {
  assignedQuerySchema,
  changeAssignedSchema,
  createAssignedSchema,
  handInSchema,
  revisionSchema,
  saveReviewSchema,
  saveWorkSchema,
  sendBackSchema,
} from '@/contract/assigned-sweeps';

import { changeAssigned } from '../commands/assigned/change';
import { createAssigned, setAgain } from '../commands/assigned/create';
import { findForAssignee, findForLab } from '../commands/assigned/find';
import { handIn } from '../commands/assigned/hand-in';
import { closeAssigned, deleteDraft, openAssigned } from '../commands/assigned/lifecycle';
import { listInLab, listMine } from '../commands/assigned/list';
import { readAssigned, readHandIn, readTask } from '../commands/assigned/read';
import { findHandIn, saveReview, sendBack } from '../commands/assigned/review';
import { readTable, tableAsCsv } from '../commands/assigned/table';
import { saveWork } from '../commands/assigned/work';
import type { Dependencies } from '../dependencies';
import { requireSignedIn, signedIn } from '../middleware/current-user';
import { parseBody, parseQuery } from '../middleware/parse';
import { demandInLab } from '../policies/lab-policy';

const labId = (request: Request) => String(request.params.labId);
const sweepId = (request: Request) => String(request.params.id);
const pageSchema = assignedQuerySchema.pick({ page: true });

/** Setting sweeps, opening and closing them. */
function settingRoutes(dependencies: Dependencies): Router {
  const router = Router();

  router.get('/labs/:labId/assigned', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    demandInLab(person, 'view lab', labId(request));
    const query = parseQuery(request, assignedQuerySchema);
    response.json(await listInLab(dependencies, person, labId(request), query));
  });

  router.post('/labs/:labId/assigned', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    demandInLab(person, 'set sweeps', labId(request));
    const body = parseBody(request, createAssignedSchema);
    const id = await createAssigned(dependencies, person, labId(request), body);
    response.status(201).json(await readAssigned(dependencies, person, id));
  });

  router.get('/assigned/:id', requireSignedIn, async (request, response) => {
    response.json(await readAssigned(dependencies, signedIn(request), sweepId(request)));
  });

  router.patch('/assigned/:id', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    await findForLab(dependencies, person, sweepId(request), 'set sweeps');
    const body = parseBody(request, changeAssignedSchema);
    await changeAssigned(dependencies, person, sweepId(request), body);
    response.json(await readAssigned(dependencies, person, sweepId(request)));
  });

  router.delete('/assigned/:id', requireSignedIn, async (request, response) => {
    await deleteDraft(dependencies, signedIn(request), sweepId(request));
    response.status(204).end();
  });

  for (const [step, move] of [
    ['open', openAssigned],
    ['close', closeAssigned],
  ] as const)
    router.post(`/assigned/:id/${step}`, requireSignedIn, async (request, response) => {
      const person = signedIn(request);
      await findForLab(dependencies, person, sweepId(request), 'set sweeps');
      const { baseRevision } = parseBody(request, revisionSchema);
      await move(dependencies, person, sweepId(request), baseRevision);
      response.json(await readAssigned(dependencies, person, sweepId(request)));
    });

  router.post('/assigned/:id/again', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    await findForLab(dependencies, person, sweepId(request), 'set sweeps');
    const { baseRevision } = parseBody(request, revisionSchema);
    const id = await setAgain(dependencies, person, sweepId(request), baseRevision);
    response.status(201).json(await readAssigned(dependencies, person, id));
  });

  return router;
}

/** Working on a sweep that is for oneself. */
function taskRoutes(dependencies: Dependencies): Router {
  const router = Router();

  router.get('/assigned', requireSignedIn, async (request, response) => {
    const { page } = parseQuery(request, pageSchema);
    response.json(await listMine(dependencies, signedIn(request), page));
  });

  router.get('/assigned/:id/task', requireSignedIn, async (request, response) => {
    response.json(await readTask(dependencies, signedIn(request), sweepId(request)));
  });

  router.put('/assigned/:id/work', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    await findForAssignee(dependencies, person, sweepId(request));
    const body = parseBody(request, saveWorkSchema);
    response.json(await saveWork(dependencies, person, sweepId(request), body));
  });

  router.post('/assigned/:id/hand-ins', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    await findForAssignee(dependencies, person, sweepId(request));
    const body = parseBody(request, handInSchema);
    response.status(201).json(await handIn(dependencies, person, sweepId(request), body));
  });

  return router;
}

/** Reviewing what was handed in. */
function reviewRoutes(dependencies: Dependencies): Router {
  const router = Router();

  router.get('/assigned/:id/table', requireSignedIn, async (request, response) => {
    response.json(await readTable(dependencies, signedIn(request), sweepId(request)));
  });

  router.get('/assigned/:id/table.csv', requireSignedIn, async (request, response) => {
    const table = await readTable(dependencies, signedIn(request), sweepId(request));
    response.attachment('hand-ins.csv').type('text/csv').send(tableAsCsv(table));
  });

  router.post('/assigned/:id/send-back', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    await findForLab(dependencies, person, sweepId(request), 'review hand-ins');
    await sendBack(dependencies, person, sweepId(request), parseBody(request, sendBackSchema));
    response.json(await readTable(dependencies, person, sweepId(request)));
  });

  router.get('/hand-ins/:id', requireSignedIn, async (request, response) => {
    response.json(await readHandIn(dependencies, signedIn(request), sweepId(request)));
  });

  router.put('/hand-ins/:id/review', requireSignedIn, async (request, response) => {
    const person = signedIn(request);
    await findHandIn(dependencies, person, sweepId(request));
    await saveReview(dependencies, person, sweepId(request), parseBody(request, saveReviewSchema));
    response.json(await readHandIn(dependencies, person, sweepId(request)));
  });

  return router;
}

/** Assigned sweeps: setting them, working on them, reviewing what was handed in. */
export function assignedRoutes(dependencies: Dependencies): Router {
  const router = Router();
  router.use(settingRoutes(dependencies), taskRoutes(dependencies), reviewRoutes(dependencies));
  return router;
}
