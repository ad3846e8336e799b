import type { ErrorRequestHandler, RequestHandler } from 'express';
import type { Logger } from 'pino';
import { UniqueConstraintError } from 'sequelize';

import type { ErrorBody } from '@/contract/errors';

import { Refusal, refuseInvalid, refuseNotFound, refuseTooLarge } from '../errors';

export const refuseUnknownRoute: RequestHandler = (_request, _response, next) =>
  next(refuseNotFound('There is no such address in this interface.'));

/** Faults of body parsing and of addresses, which arrive as errors of the framework's. */
function asRefusal(error: unknown): Refusal | null {
  if (error instanceof Refusal) return error;
  if (error instanceof UniqueConstraintError) {
    return new Refusal(409, 'conflict', 'Someone changed this at the same moment. Reload and try again.');
  }
  const { type, status } = (error ?? {}) as { type?: unknown; status?: unknown };
  if (type === 'entity.too.large' || status === 413) {
    return refuseTooLarge('The request is larger than the server takes. Shorten the document and try again.');
  }
  if (type === 'entity.parse.failed') return refuseInvalid({}, 'The body is not JSON.');
  if (error instanceof URIError) return refuseNotFound();
  if (typeof status === 'number' && status >= 400 && status < 500) {
    return new Refusal(status, 'invalid', 'The request cannot be read as it was sent.');
  }
  return null;
}

/** Puts every failure into the envelope; what was not foreseen is logged and told without its inside. */
export function answerErrors(logger: Logger): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    if (response.headersSent) return next(error);
    const requestId = String(request.id ?? '');
    const refusal = asRefusal(error);
    if (refusal === null) logger.error({ err: error, requestId }, 'a request failed');
    const body: ErrorBody = {
      error: {
        code: refusal?.code ?? 'internal',
        message:
          refusal?.message ??
          'The server met a fault of its own. Nothing was changed; try again in a moment.',
        ...refusal?.more,
        requestId,
      },
    };
    response.status(refusal?.status ?? 500).json(body);
  };
}
