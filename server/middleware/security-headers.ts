import type { RequestHandler } from 'express';
import helmet from 'helmet';

import type { Settings } from '../dependencies';

/** leva inserts its rules into a style element that is empty: this is the hash of nothing. */
const EMPTY_STYLE = "'sha256-47DEQpj8HBSa+/TImW+5JCeuQeRkm5NMpJWZG3hSuFU='";

/** Nothing from elsewhere, no inline script, no eval; WebAssembly is compiled from bytes of our own making. */
export function securityHeaders(settings: Settings): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
        styleSrc: ["'self'", EMPTY_STYLE],
        styleSrcAttr: ["'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'"],
        workerSrc: ["'self'"],
        connectSrc: ["'self'"],
        objectSrc: ["'none'"],
        frameAncestors: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
      },
    },
    crossOriginEmbedderPolicy: false,
    strictTransportSecurity: settings.secureCookies,
    referrerPolicy: { policy: 'same-origin' },
  });
}
