import type { RequestHandler } from 'express';
import helmet from 'helmet';

import type { Settings } from '../dependencies';

/** Nothing from elsewhere, no inline script, no eval; WebAssembly is compiled from bytes of our own making. */
export function securityHeaders(settings: Settings): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
        // leva and KaTeX write styles at run time; styles alone may be inline, scripts never.
        styleSrc: ["'self'", "'unsafe-inline'"],
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
