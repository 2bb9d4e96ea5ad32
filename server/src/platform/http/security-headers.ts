import helmet from 'helmet';
import type { NextFunction, Request, Response } from 'express';
import type { Config } from '../config/config.ts';

/**
 * The content policy allows only what the app ships. `wasm-unsafe-eval` is for the drawing viewer's decoders,
 * inline styles for dialogs that set their position.
 */
export function securityHeaders(config: Config) {
  const isHttps = config.appUrl.startsWith('https:');
  const paymentPage = config.stripe.pageUrl ?? 'https://checkout.stripe.com';
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'none'"],
        scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
        styleSrc: ["'self'", "'unsafe-inline'"],
        imgSrc: ["'self'", 'blob:', 'data:'],
        connectSrc: ["'self'"],
        fontSrc: ["'self'"],
        workerSrc: ["'self'"],
        manifestSrc: ["'self'"],
        baseUri: ["'none'"],
        formAction: ["'self'", new URL(paymentPage).origin],
        frameAncestors: ["'none'"],
        objectSrc: ["'none'"],
      },
    },
    strictTransportSecurity: isHttps ? { maxAge: 31_536_000, includeSubDomains: false } : false,
    referrerPolicy: { policy: 'same-origin' },
    crossOriginOpenerPolicy: { policy: 'same-origin' },
    crossOriginResourcePolicy: { policy: 'same-origin' },
    xFrameOptions: { action: 'deny' },
  });
}

/** No answer of the API is kept by a browser or a proxy unless its route says otherwise. */
export function noStore(request: Request, response: Response, next: NextFunction): void {
  if (request.path.startsWith('/api/')) response.setHeader('Cache-Control', 'no-store');
  next();
}
