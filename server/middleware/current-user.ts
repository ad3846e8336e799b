import type { Request, RequestHandler } from 'express';

import type { Role } from '@/contract/rights';

import type { Dependencies } from '../dependencies';
import { refuseNotSignedIn } from '../errors';

/** Who makes the request, with memberships as they are now. */
export interface Person {
  id: string;
  name: string;
  email: string;
  demo: boolean;
  memberships: { labId: string; labName: string; role: Role }[];
}

const people = new WeakMap<Request, Person>();

export async function readPerson(
  { database, settings }: Dependencies,
  userId: string,
): Promise<Person | null> {
  const { User, Membership } = database.models;
  const user = await User.findByPk(userId);
  // People of the demo exist only while the demo does.
  if (user === null || (user.demo && !settings.demo)) return null;
  const memberships = await Membership.findAll({ where: { userId }, include: [{ association: 'lab' }] });
  return {
    id: user.id,
    name: user.name,
    email: user.email,
    demo: user.demo,
    memberships: memberships
      .map(({ labId, lab, role }) => ({ labId, labName: lab?.name ?? '', role }))
      .sort((a, b) => a.labName.localeCompare(b.labName)),
  };
}

/** Finds the person of the session, if any. */
export function findPerson(dependencies: Dependencies): RequestHandler {
  return async (request, _response, next) => {
    const { userId } = request.session;
    const person = userId === undefined ? null : await readPerson(dependencies, userId);
    if (person) people.set(request, person);
    next();
  };
}

export function visitorOrPerson(request: Request): Person | null {
  return people.get(request) ?? null;
}

/** The person signed in, or a refusal. */
export function signedIn(request: Request): Person {
  const person = people.get(request);
  if (person === undefined) throw refuseNotSignedIn();
  return person;
}

export const requireSignedIn: RequestHandler = (request, _response, next) => {
  signedIn(request);
  next();
};
