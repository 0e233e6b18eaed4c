import type { RequestHandler } from 'express';
import helmet from 'helmet';

const year = 31_536_000;

/**
 * Static headers, the same for every answer: a service worker keeps index.html, so that nonces would go stale in its
 * cache. Angular and Material put <style> elements in, therefore 'unsafe-inline' for styles alone; scripts come from
 * our own files only, and Trusted Types leave four named policies.
 */
export function securityHeaders({ isProduction }: { isProduction: boolean }): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        'default-src': ["'self'"],
        'script-src': ["'self'"],
        'style-src': ["'self'", "'unsafe-inline'"],
        'img-src': ["'self'", 'data:'],
        'object-src': ["'none'"],
        'base-uri': ["'self'"],
        'form-action': ["'self'"],
        'frame-ancestors': ["'none'"],
        'require-trusted-types-for': ["'script'"],
        'trusted-types': ['angular', 'angular#bundler', 'angular#components', 'app#sw'],
      },
    },
    referrerPolicy: { policy: 'no-referrer' },
    xFrameOptions: { action: 'deny' },
    strictTransportSecurity: isProduction ? { maxAge: 2 * year, includeSubDomains: false } : false,
  });
}
