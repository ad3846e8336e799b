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

interface PersonRow {
  name: string;
  email: string;
  demo: 0 | 1;
  labId: string | null;
  labName: string;
  role: Role;
}

/** Read with every request, hence in one statement. */
export async function readPerson(
  { database, settings }: Dependencies,
  userId: string,
): Promise<Person | null> {
  const rows = await database.read<PersonRow>(
    `SELECT u.name, u.email, u.demo, m.labId, m.role, l.name AS labName FROM users u
     LEFT JOIN memberships m ON m.userId = u.id LEFT JOIN labs l ON l.id = m.labId WHERE u.id = $userId`,
    { userId },
  );
  const [user] = rows;
  // People of the demo exist only while the demo does.
  if (user === undefined || (user.demo === 1 && !settings.demo)) return null;
  return {
    id: userId,
    name: user.name,
    email: user.email,
    demo: user.demo === 1,
    memberships: rows
      .flatMap(({ labId, labName, role }) => (labId === null ? [] : [{ labId, labName, role }]))
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
