import { createHmac, randomBytes, timingSafeEqual } from 'node:crypto';

import type { Request, RequestHandler, Response } from 'express';

import type { Settings } from '../dependencies';
import { refuseForgedRequest } from '../errors';

const COOKIE = 'moiety.visit';
const HEADER = 'x-csrf-token';
const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

function cookieValue(request: Request): string | null {
  const found = /(?:^|;\s*)moiety\.visit=([A-Za-z0-9_-]{20,64})(?:;|$)/.exec(request.headers.cookie ?? '');
  return found?.[1] ?? null;
}

function tokenOf(settings: Settings, visit: string, userId: string): string {
  return createHmac('sha256', settings.sessionSecret).update(`csrf ${visit} ${userId}`).digest('base64url');
}

/**
 * Token for the page: an HMAC over a cookie that scripts cannot read and over who is signed in, so that
 * visitors need no session and a token of another person or visit is worthless.
 */
export function issueCsrfToken(request: Request, response: Response, settings: Settings): string {
  const visit = cookieValue(request) ?? randomBytes(24).toString('base64url');
  response.cookie(COOKIE, visit, {
    httpOnly: true,
    sameSite: 'lax',
    secure: settings.secureCookies,
    path: '/',
  });
  return tokenOf(settings, visit, request.session.userId ?? '');
}

function sameText(a: string, b: string): boolean {
  const left = Buffer.from(a);
  const right = Buffer.from(b);
  return left.length === right.length && timingSafeEqual(left, right);
}

/** Browsers say where a request began: by `Sec-Fetch-Site`, whatever proxy it passed, or else by `Origin`. */
function comesFromElsewhere(request: Request, settings: Settings): boolean {
  const site = request.get('sec-fetch-site');
  if (site === 'same-origin') return false;
  if (site !== undefined && site !== 'none') return true;
  const origin = request.get('origin');
  if (origin === undefined) return false;
  if (!URL.canParse(origin)) return true;
  return new URL(origin).host !== request.get('host') && origin !== new URL(settings.publicUrl).origin;
}

/** Refuses changes that did not start on a page of ours. */
export function refuseForgeries(settings: Settings): RequestHandler {
  return (request, _response, next) => {
    if (SAFE.has(request.method)) return next();
    const visit = cookieValue(request);
    const token = request.get(HEADER) ?? '';
    const right = visit !== null && sameText(token, tokenOf(settings, visit, request.session.userId ?? ''));
    next(right && !comesFromElsewhere(request, settings) ? undefined : refuseForgedRequest());
  };
}
