import { ipKeyGenerator, rateLimit, type RateLimitRequestHandler } from 'express-rate-limit';

import { refuseTooMany } from '../errors';

export interface RateLimitSettings {
  windowMinutes: number;
  signIn: number;
  signUp: number;
  mail: number;
}

export const DEFAULT_RATE_LIMITS: RateLimitSettings = { windowMinutes: 15, signIn: 10, signUp: 20, mail: 6 };

/** Attempts an address may make in a window; signing in counts an address and an account together. */
export interface RateLimits {
  signIn: RateLimitRequestHandler;
  signUp: RateLimitRequestHandler;
  mail: RateLimitRequestHandler;
}

export function createRateLimits(settings: RateLimitSettings = DEFAULT_RATE_LIMITS): RateLimits {
  const limit = (most: number, withAccount: boolean) =>
    rateLimit({
      windowMs: settings.windowMinutes * 60_000,
      limit: most,
      standardHeaders: 'draft-8',
      legacyHeaders: false,
      keyGenerator: (request) => {
        const from = ipKeyGenerator(request.ip ?? '');
        const email = (request.body as { email?: unknown } | undefined)?.email;
        return withAccount && typeof email === 'string'
          ? `${from} ${email.trim().toLowerCase().slice(0, 254)}`
          : from;
      },
      handler: (_request, _response, next) => next(refuseTooMany(settings.windowMinutes)),
    });
  return {
    signIn: limit(settings.signIn, true),
    signUp: limit(settings.signUp, false),
    mail: limit(settings.mail, true),
  };
}
