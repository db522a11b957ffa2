import compression from 'compression';
import cookieParser from 'cookie-parser';
import express, { type Express } from 'express';
import helmet from 'helmet';
import { pinoHttp } from 'pino-http';
import type { Context } from './context';
import { answerError, answerUnknown } from './http/errors';
import { demandKnownHost, demandOwnPage } from './http/guards';
import { createRoutes } from './http/routes';
import { site } from './http/site';
import { resources } from './resources';

const OURS = ["'self'"];

/** Only what we serve ourselves: no inline script or style, no foreign address, no foreign frame around us. */
const securityHeaders = () =>
  helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'none'"],
        scriptSrc: OURS,
        styleSrc: OURS,
        fontSrc: OURS,
        imgSrc: ["'self'", 'data:', 'blob:'],
        connectSrc: OURS,
        workerSrc: OURS,
        manifestSrc: OURS,
        frameSrc: ["'self'", 'blob:'],
        formAction: OURS,
        baseUri: ["'none'"],
        frameAncestors: OURS,
      },
    },
    // The server itself speaks plain http; whoever puts https in front sets this there.
    strictTransportSecurity: false,
    referrerPolicy: { policy: 'no-referrer' },
  });

/** Tokens stand in addresses of links; they never reach the log. */
const withoutToken = (url: string) => url.replace(/^(\/(?:calendar|guest|invitation|api\/invitations|api\/guest)\/)[^/?.]+/, '$1…');

/** Builds the app; tests use it without listening. */
export function createApp(context: Context): Express {
  const app = express();
  app.disable('x-powered-by');
  // Answers of the API are never kept; a calendar sets a tag of its own.
  app.disable('etag');
  app.use(
    pinoHttp({
      logger: context.log,
      customLogLevel: (_request, response, error) => (error || response.statusCode >= 500 ? 'error' : 'debug'),
      // Neither headers nor bodies: cookies, passwords and addresses of people do not belong in a log.
      serializers: {
        req: ({ method, url }: { method: string; url: string }) => ({ method, url: withoutToken(url) }),
        res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
        // An error of the database carries its statement, and with it what people typed.
        err: ({ name, message, stack }: Error) => ({ name, message, stack }),
      },
    }),
  );
  app.use(demandKnownHost(context));
  app.use(securityHeaders());
  app.use(compression());
  app.use('/api', (_request, response, next) => {
    response.setHeader('Cache-Control', 'no-store');
    next();
  });
  app.use(demandOwnPage());
  app.use(cookieParser());
  const routes = createRoutes(context);
  for (const open of resources) open(routes, context);
  app.use(routes.router);
  app.use('/api', answerUnknown);
  app.use(site(context.config.dist));
  app.use(answerUnknown);
  app.use(answerError);
  return app;
}
