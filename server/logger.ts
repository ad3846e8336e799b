import { pino, type DestinationStream, type Logger } from 'pino';

/** Addresses in logs lose the tokens that open things: share links and mailed links. */
export function concealTokens(url: string): string {
  return url
    .replace(/(\/shared\/)[^/?#]+/gi, '$1[token]')
    .replace(/([?&][^=&#]*token[^=&#]*=)[^&#]*/gi, '$1[token]');
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
  const options = { level, base: undefined, redact: { paths: SECRETS, censor: '[concealed]' } };
  return destination === undefined ? pino(options) : pino(options, destination);
}
