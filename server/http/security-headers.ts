import {type RequestHandler} from 'express';
import helmet from 'helmet';
import {type Config} from '../config';

/** What a page of ours may load and who may frame it, and the build it comes from. */
export function securityHeaders(config: Config): RequestHandler[] {
  return [
    helmet({
      contentSecurityPolicy: {
        useDefaults: false,
        directives: {
          defaultSrc: ["'self'"],
          scriptSrc: ["'self'"],
          styleSrc: ["'self'", "'unsafe-inline'"], // Angular writes the styles of parts into the page
          imgSrc: ["'self'", 'data:', 'blob:'],
          objectSrc: ["'none'"],
          frameAncestors: ["'none'"],
          baseUri: ["'self'"],
          formAction: ["'self'"],
        },
      },
      frameguard: {action: 'deny'},
      strictTransportSecurity: config.isSecure,
    }),
    (req, res, next) => {
      res.set('Evenspan-Build', config.build);
      next();
    },
  ];
}
