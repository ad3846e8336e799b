import { Router, type Request } from 'express';

import {
  changeRoleSchema,
  inviteSchema,
  labNameBodySchema,
  previewInvitationsSchema,
  resendSchema,
  type LabBody,
} from '@/contract/labs';
import { roleMay } from '@/contract/rights';

import {
  invite,
  listInvitations,
  resendInvitation,
  withdrawInvitation,
} from '../commands/invitation-commands';
import { judgeInvitations } from '../commands/judge-invitations';
import { createLab, renameLab } from '../commands/lab-commands';
import { changeRole, describeDeparture, endMembership } from '../commands/member-commands';
import type { Dependencies } from '../dependencies';
import { refuseNotFound } from '../errors';
import { requireSignedIn, signedIn } from '../middleware/current-user';
import { parseBody } from '../middleware/parse';
import { demandInLab } from '../policies/lab-policy';
import { presentLab, type MemberRow } from '../presenters/present-lab';

const labId = (request: Request) => String(request.params.labId);
const userId = (request: Request) => String(request.params.userId);
const invitationId = (request: Request) => String(request.params.invitationId);

/** Labs, their members, and whom they invite. */
export function labRoutes(dependencies: Dependencies): Router {
  const { database } = dependencies;
  const router = Router();
  router.use('/labs', requireSignedIn);

  /** The lab as it is now, for a person whose membership may just have changed. */
  const readLab = async (personId: string, id: string): Promise<LabBody> => {
    const [lab] = await database.read<{ id: string; name: string }>(
      'SELECT id, name FROM labs WHERE id = $id',
      { id },
    );
    const members = await database.read<MemberRow>(
      `SELECT u.id, u.name, u.email, m.role, m.joinedAt FROM memberships m JOIN users u ON u.id = m.userId
       WHERE m.labId = $id`,
      { id },
    );
    const mine = members.find((one) => one.id === personId);
    if (lab === undefined || mine === undefined) throw refuseNotFound();
    return presentLab(lab, mine.role, roleMay(mine.role, 'view members') ? members : []);
  };

  router.post('/labs', async (request, response) => {
    const person = signedIn(request);
    const id = await createLab(dependencies, person, parseBody(request, labNameBodySchema).name);
    response.status(201).json(await readLab(person.id, id));
  });

  router.get('/labs/:labId', async (request, response) => {
    const person = signedIn(request);
    demandInLab(person, 'view lab', labId(request));
    response.json(await readLab(person.id, labId(request)));
  });

  router.patch('/labs/:labId', async (request, response) => {
    const person = signedIn(request);
    demandInLab(person, 'rename the lab', labId(request));
    await renameLab(dependencies, person, labId(request), parseBody(request, labNameBodySchema).name);
    response.json(await readLab(person.id, labId(request)));
  });

  router.patch('/labs/:labId/members/:userId', async (request, response) => {
    const person = signedIn(request);
    demandInLab(person, 'change roles', labId(request));
    const { role } = parseBody(request, changeRoleSchema);
    await changeRole(dependencies, person, labId(request), userId(request), role);
    response.json(await readLab(person.id, labId(request)));
  });

  router.get('/labs/:labId/members/:userId/departure', async (request, response) => {
    const person = signedIn(request);
    const right = userId(request) === person.id ? 'leave the lab' : 'remove members';
    demandInLab(person, right, labId(request));
    response.json(await describeDeparture(dependencies, labId(request), userId(request)));
  });

  router.delete('/labs/:labId/members/:userId', async (request, response) => {
    await endMembership(dependencies, signedIn(request), labId(request), userId(request));
    response.status(204).end();
  });

  router.get('/labs/:labId/invitations', async (request, response) => {
    response.json(await listInvitations(dependencies, signedIn(request), labId(request)));
  });

  router.post('/labs/:labId/invitations/preview', async (request, response) => {
    demandInLab(signedIn(request), 'invite members', labId(request));
    const { rows, role } = parseBody(request, previewInvitationsSchema);
    response.json(await judgeInvitations(database, labId(request), rows, role));
  });

  router.post('/labs/:labId/invitations', async (request, response) => {
    const person = signedIn(request);
    demandInLab(person, 'invite members', labId(request));
    await invite(dependencies, person, labId(request), parseBody(request, inviteSchema));
    response.status(201).json(await listInvitations(dependencies, person, labId(request)));
  });

  router.post('/labs/:labId/invitations/:invitationId/resend', async (request, response) => {
    const person = signedIn(request);
    demandInLab(person, 'invite members', labId(request));
    const { days } = parseBody(request, resendSchema);
    await resendInvitation(dependencies, person, labId(request), invitationId(request), days);
    response.json(await listInvitations(dependencies, person, labId(request)));
  });

  router.delete('/labs/:labId/invitations/:invitationId', async (request, response) => {
    await withdrawInvitation(dependencies, signedIn(request), labId(request), invitationId(request));
    response.status(204).end();
  });

  return router;
}
