import { Router, type Request } from 'express';

import { auditQuerySchema } from '@/contract/audit';
import { roleMay } from '@/contract/rights';

import { auditAsCsv, listAudit } from '../audit/list-audit';
import type { Dependencies } from '../dependencies';
import { refuseNotAllowed, refuseNotFound } from '../errors';
import { requireSignedIn, signedIn } from '../middleware/current-user';
import { parseQuery } from '../middleware/parse';

/** The lab of the request, for those who may read its history. */
function labWithHistory(request: Request): string {
  const mine = signedIn(request).memberships.find(({ labId }) => labId === request.params.labId);
  if (mine === undefined) throw refuseNotFound();
  if (!roleMay(mine.role, 'view lab history'))
    throw refuseNotAllowed('Your role in this lab does not let you read its history. Ask a supervisor.');
  return mine.labId;
}

export function auditRoutes({ database }: Dependencies): Router {
  const router = Router();
  router.get('/labs/:labId/audit', requireSignedIn, async (request, response) => {
    const labId = labWithHistory(request);
    response.json(await listAudit(database, labId, parseQuery(request, auditQuerySchema)));
  });
  router.get('/labs/:labId/audit.csv', requireSignedIn, async (request, response) => {
    const labId = labWithHistory(request);
    response
      .attachment('history.csv')
      .type('text/csv')
      .send(await auditAsCsv(database, labId, parseQuery(request, auditQuerySchema)));
  });
  router.get('/account/audit', requireSignedIn, async (request, response) => {
    const { page } = parseQuery(request, auditQuerySchema.pick({ page: true }));
    response.json(await listAudit(database, null, { person: signedIn(request).id, page }));
  });
  return router;
}
