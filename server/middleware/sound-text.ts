import type { RequestHandler } from 'express';

import { refuseInvalid, refuseNotFound } from '../errors';

/** Deeper than any document, and far from the end of the stack of whatever walks a body later. */
const DEEPEST = 32;

/** What makes a parsed body or query unfit whatever its shape, with its place; null for a sound one. */
export function findUnsoundValue(body: unknown): { path: string; reason: string } | null {
  const open: { value: unknown; path: string; depth: number }[] = [{ value: body, path: '', depth: 0 }];
  for (let next = open.pop(); next !== undefined; next = open.pop()) {
    const { value, path, depth } = next;
    if (typeof value === 'string' && value.includes('\0')) {
      return { path, reason: 'This text holds a NUL character, which cannot be kept. Take it out.' };
    }
    if (typeof value === 'number' && !Number.isFinite(value)) {
      return { path, reason: 'This number is too large. A finite number is needed.' };
    }
    if (typeof value !== 'object' || value === null) continue;
    if (depth === DEEPEST) return { path, reason: 'This is nested too deeply.' };
    for (const [key, inner] of Object.entries(value)) {
      if (key.includes('\0') || key === '__proto__') {
        return { path, reason: 'This holds a name that cannot be kept.' };
      }
      open.push({ value: inner, path: path === '' ? key : `${path}.${key}`, depth: depth + 1 });
    }
  }
  return null;
}

/** SQLite ends a text at its first NUL and JSON turns infinity into nothing, so neither is let in. */
export const refuseUnsound: RequestHandler = (request, _response, next) => {
  if (/%00|\0/.test(request.path)) return next(refuseNotFound());
  const found = findUnsoundValue(request.query) ?? findUnsoundValue(request.body);
  next(found === null ? undefined : refuseInvalid({ [found.path || 'body']: found.reason }));
};
