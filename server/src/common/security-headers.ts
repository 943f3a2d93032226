import helmet from 'helmet';
import type { RequestHandler } from 'express';

const HSTS_MAX_AGE_S = 63_072_000;

/**
 * The headers of every answer.
 *
 * `style-src` allows inline styles because the dialogs of the component library write `<style>` elements; scripts never
 * may be inline. COOP and COEP make the pages cross-origin isolated, which gives the analyser finer timers.
 */
export function securityHeaders(options: { isHttps: boolean }): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        baseUri: ["'none'"],
        objectSrc: ["'none'"],
        frameAncestors: ["'none'"],
        formAction: ["'self'"],
        scriptSrc: ["'self'"],
        scriptSrcAttr: ["'none'"],
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        mediaSrc: ["'self'", 'blob:'],
        fontSrc: ["'self'"],
        connectSrc: ["'self'"],
        workerSrc: ["'self'"],
        manifestSrc: ["'self'"],
      },
    },
    crossOriginEmbedderPolicy: { policy: 'require-corp' },
    crossOriginOpenerPolicy: { policy: 'same-origin' },
    crossOriginResourcePolicy: { policy: 'same-origin' },
    referrerPolicy: { policy: 'no-referrer' },
    strictTransportSecurity: options.isHttps ? { maxAge: HSTS_MAX_AGE_S, includeSubDomains: true } : false,
    xFrameOptions: { action: 'deny' },
  });
}
