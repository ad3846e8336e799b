import { pino, type DestinationStream, type Logger } from 'pino';

/** Addresses in logs lose the tokens that open things: share links, invitations and mailed links. */
export function concealTokens(url: string): string {
  return url
    .replace(/(\/(?:shared|invitations)\/)[^/?#]+/gi, '$1[token]')
    .replace(/([?&][^=&#]*token[^=&#]*=)[^&#]*/gi, '$1[token]');
}

/** Of an error its words and place alone: those of the database carry statements with all their values. */
export function describeError(error: unknown): object {
  return error instanceof Error
    ? { type: error.name, message: error.message, stack: error.stack }
    : { message: String(error) };
}

const SECRETS = [
  'password',
  'current',
  'next',
  'token',
  'csrfToken',
  'cookie',
  'authorization',
  'req.headers.cookie',
  'req.headers.authorization',
  'req.headers["x-csrf-token"]',
  'res.headers["set-cookie"]',
  'body',
];

export function createLogger(level: string, destination?: DestinationStream): Logger {
  const options = {
    level,
    base: undefined,
    redact: { paths: SECRETS, censor: '[concealed]' },
    serializers: { err: describeError },
  };
  return destination === undefined ? pino(options) : pino(options, destination);
}
