import { createHash } from 'node:crypto';

import { Router, type Request, type RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';

import { refuseTooMany } from '../errors';

export interface RateLimitSettings {
  windowMinutes: number;
  /** Failed attempts at one account from one place. */
  signIn: number;
  /** Sign-ups from one place; also failed attempts at mailed tokens and at one's own password. */
  signUp: number;
  /** Messages to one address. */
  mail: number;
}

export const DEFAULT_RATE_LIMITS: RateLimitSettings = { windowMinutes: 15, signIn: 10, signUp: 20, mail: 6 };

/** The demo is one person on one machine: only a runaway script needs a limit. */
export const DEMO_RATE_LIMITS: RateLimitSettings = { windowMinutes: 15, signIn: 200, signUp: 400, mail: 120 };

/** One place may try this many accounts, or addresses, before it is stopped whatever it asks for. */
const BREADTH = 10;

/** Attempts allowed within a window; where there are two counters, both must agree. */
export interface RateLimits {
  signIn: RequestHandler;
  signUp: RequestHandler;
  mail: RequestHandler;
  secrets: RequestHandler;
}

const placeOf = (request: Request) => ipKeyGenerator(request.ip ?? '');

/** The address in a body that nobody has checked yet; hashed, so that keys stay short and private. */
function addressOf(request: Request): string {
  const email = (request.body as { email?: unknown } | undefined)?.email;
  const text = typeof email === 'string' ? email.trim().toLowerCase() : '';
  return createHash('sha256').update(text).digest('base64url');
}

const both = (first: RequestHandler, second: RequestHandler): RequestHandler => Router().use(first, second);

export function createRateLimits(settings: RateLimitSettings = DEFAULT_RATE_LIMITS): RateLimits {
  const limit = (most: number, keyGenerator: (request: Request) => string, failuresOnly = false) =>
    rateLimit({
      windowMs: settings.windowMinutes * 60_000,
      limit: most,
      standardHeaders: 'draft-8',
      legacyHeaders: false,
      skipSuccessfulRequests: failuresOnly,
      keyGenerator,
      handler: (_request, _response, next) => next(refuseTooMany(settings.windowMinutes)),
    });
  // One counter for both ways of making the server write to an address.
  const toOneAddress = limit(settings.mail, addressOf);
  return {
    signIn: both(
      limit(settings.signIn * BREADTH, placeOf, true),
      limit(settings.signIn, (request) => `${placeOf(request)} ${addressOf(request)}`, true),
    ),
    signUp: both(limit(settings.signUp, placeOf), toOneAddress),
    mail: both(limit(settings.mail * BREADTH, placeOf), toOneAddress),
    secrets: limit(settings.signUp, placeOf, true),
  };
}
