import type { RequestHandler } from 'express';
import helmet from 'helmet';
import type { Config } from '../config/config.js';

/** Headers of every answer, error pages and files included. */
export function securityHeaders(config: Pick<Config, 'publicUrl'>): RequestHandler {
  const isHttps = config.publicUrl.startsWith('https:');
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'"],
        scriptSrcAttr: ["'none'"],
        // Vuetify writes its theme into a style element, and components set style attributes.
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'"],
        connectSrc: ["'self'"],
        workerSrc: ["'self'", 'blob:'],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        ...(isHttps ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: isHttps ? { maxAge: 31_536_000, includeSubDomains: true } : false,
    referrerPolicy: { policy: 'no-referrer' },
    xFrameOptions: { action: 'deny' },
  });
}
