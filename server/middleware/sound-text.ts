import type { RequestHandler } from 'express';

import { refuseInvalid, refuseNotFound } from '../errors';

/** SQLite ends a text at its first NUL, so none is let in: not in an address, not in a body. */
export const refuseNul: RequestHandler = (request, _response, next) => {
  if (/%00|\0/.test(request.path)) return next(refuseNotFound());
  if (request.body !== undefined && JSON.stringify(request.body).includes('\\u0000')) {
    return next(
      refuseInvalid({}, 'A text holds a NUL character, which cannot be kept. Take it out and try again.'),
    );
  }
  next();
};
