import { Router } from 'express';

import type { LabBody } from '@/contract/account';
import { roleMay } from '@/contract/rights';

import type { Dependencies } from '../dependencies';
import { refuseNotFound } from '../errors';
import { requireSignedIn, signedIn } from '../middleware/current-user';

export function labRoutes({ database }: Dependencies): Router {
  const router = Router();
  router.get('/labs/:labId', requireSignedIn, async (request, response) => {
    const mine = signedIn(request).memberships.find(({ labId }) => labId === request.params.labId);
    if (mine === undefined || !roleMay(mine.role, 'view lab')) throw refuseNotFound();
    const memberships = roleMay(mine.role, 'view members')
      ? await database.models.Membership.findAll({
          where: { labId: mine.labId },
          include: [{ association: 'user' }],
        })
      : [];
    const body: LabBody = {
      id: mine.labId,
      name: mine.labName,
      role: mine.role,
      members: memberships
        .map(({ userId, role, user }) => ({ id: userId, name: user?.name ?? '', role }))
        .sort((a, b) => a.name.localeCompare(b.name)),
    };
    response.json(body);
  });
  return router;
}
