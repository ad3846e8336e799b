import { handInSchema, saveWorkSchema, type HandIn, type SaveWork } from '@/contract/assigned-sweeps';
import type { z } from 'zod';

const PREFIX = 'moiety.assigned.';

/** What an assignee has in this browser that the server may not have yet. */
export interface LocalPlace {
  readonly userId: string;
  readonly assignedId: string;
}

const workKey = ({ userId, assignedId }: LocalPlace) => `${PREFIX}${userId}.${assignedId}.work`;
const handInKey = ({ userId, assignedId }: LocalPlace) => `${PREFIX}${userId}.${assignedId}.hand-in`;

function keep(key: string, value: unknown): boolean {
  try {
    localStorage.setItem(key, JSON.stringify(value));
    return true;
  } catch {
    // No room, or no storage allowed: the server's copy is the only one then.
    return false;
  }
}

function forget(key: string): void {
  try {
    localStorage.removeItem(key);
  } catch {
    // Without storage there is nothing to forget.
  }
}

/** What cannot be read any more counts as none. */
function read<Schema extends z.ZodType>(key: string, schema: Schema): z.infer<Schema> | null {
  try {
    const parsed = schema.safeParse(JSON.parse(localStorage.getItem(key) ?? 'null'));
    return parsed.success ? parsed.data : null;
  } catch {
    return null;
  }
}

export const keepWorkLocally = (place: LocalPlace, work: SaveWork) => keep(workKey(place), work);
export const forgetLocalWork = (place: LocalPlace) => forget(workKey(place));
export const readLocalWork = (place: LocalPlace) => read(workKey(place), saveWorkSchema);

/** A hand-in stays here from the press of its button until its receipt has come. */
export const keepHandInLocally = (place: LocalPlace, body: HandIn) => keep(handInKey(place), body);
export const forgetLocalHandIn = (place: LocalPlace) => forget(handInKey(place));
export const readLocalHandIn = (place: LocalPlace) => read(handInKey(place), handInSchema);
