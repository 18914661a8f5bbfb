import path from 'node:path';
import compression from 'compression';
import express, { type Express, Router } from 'express';
import helmet from 'helmet';
import { bracketRoutes } from './features/brackets/routes.ts';
import { clientRoutes } from './features/clients/routes.ts';
import { commissionRoutes } from './features/commissions/routes.ts';
import { frameRoutes } from './features/frames/routes.ts';
import { deskRoutes } from './features/desk/routes.ts';
import { docsRoutes } from './features/docs/routes.ts';
import { guestRoutes } from './features/guests/routes.ts';
import { guestSheetRoutes } from './features/guest-sheets/routes.ts';
import { healthRoutes } from './features/health/routes.ts';
import { mailRoutes } from './features/mail/routes.ts';
import { markRoutes } from './features/marks/routes.ts';
import { openLinkRoutes } from './features/open-links/routes.ts';
import { pickListRoutes } from './features/pick-lists/routes.ts';
import { pictureRoutes } from './features/pictures/routes.ts';
import { recordRoutes } from './features/record/routes.ts';
import { sheetRoutes } from './features/sheets/routes.ts';
import { uploadRoutes } from './features/uploads/routes.ts';
import { viewRoutes } from './features/views/routes.ts';
import { watermarkRoutes } from './features/watermark/routes.ts';
import { signInRoutes } from './features/sign-in/routes.ts';
import { studioRoutes } from './features/studios/routes.ts';
import { teamRoutes } from './features/team/routes.ts';
import { archiveRoutes } from './features/archives/routes.ts';
import { deliveryDownloadRoutes } from './features/deliveries/download-routes.ts';
import { deliveryRoutes } from './features/deliveries/routes.ts';
import { finalRoutes } from './features/finals/routes.ts';
import { notFound, problems } from './middleware/problem.ts';
import { requestLog } from './middleware/request-log.ts';
import type { RouteContext } from './middleware/route-context.ts';
import { sameOrigin } from './middleware/same-origin.ts';

/** The features' routers below /api, in the order of a commission's life. */
export function apiRoutes(routes: RouteContext): Router {
  const api = Router();
  api.use(deskRoutes(routes));
  api.use(clientRoutes(routes));
  api.use(commissionRoutes(routes));
  api.use(viewRoutes(routes));
  api.use(uploadRoutes(routes));
  api.use(frameRoutes(routes));
  api.use(bracketRoutes(routes));
  api.use(recordRoutes(routes));
  api.use(guestRoutes(routes));
  api.use(mailRoutes(routes));
  api.use(watermarkRoutes(routes));
  api.use(sheetRoutes(routes));
  api.use(guestSheetRoutes(routes));
  api.use(openLinkRoutes(routes));
  api.use(markRoutes(routes));
  api.use(pickListRoutes(routes));
  api.use(signInRoutes(routes));
  api.use(studioRoutes(routes));
  api.use(teamRoutes(routes));
  api.use(finalRoutes(routes));
  api.use(archiveRoutes(routes));
  api.use(deliveryRoutes(routes));
  api.use(deliveryDownloadRoutes(routes));
  api.use(docsRoutes(routes));
  return api;
}

/** The application without a port: middleware in its order, the features, the web pages, the errors. */
export function buildApp(routes: RouteContext, observe?: express.RequestHandler): Express {
  const { ctx } = routes;
  const { config, log } = ctx;
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', config.trustProxy);
  app.set('query parser', 'simple');
  app.use(requestLog(log));
  if (observe) app.use(observe);
  app.use(securityHeaders(config.secureCookies, config.picturesFrom === 'store' ? config.store.endpoint : undefined));
  app.use(healthRoutes(ctx));
  app.use('/api', sameOrigin(config), express.json({ limit: '256kb' }), noStore, apiRoutes(routes), notFound);
  app.use(pictureRoutes(ctx));
  app.use(webPages(path.resolve(config.webRoot)));
  app.use(problems(log));
  return app;
}

const noStore: express.RequestHandler = (_req, res, next) => {
  res.setHeader('Cache-Control', 'private, no-store');
  next();
};

function securityHeaders(https: boolean, pictures: string | undefined): express.RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        imgSrc: ["'self'", 'data:', 'blob:', ...(pictures ? [pictures] : [])],
        styleSrc: ["'self'", "'unsafe-inline'"],
        workerSrc: ["'self'", 'blob:'],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
      },
    },
    strictTransportSecurity: https,
    referrerPolicy: { policy: 'no-referrer' },
  });
}

/** The built pages: files with a hash in their name are kept for a year, everything else is the one page that routes by itself. */
function webPages(root: string): Router {
  const router = Router();
  router.use(compression());
  router.use('/assets', express.static(path.join(root, 'assets'), { immutable: true, maxAge: '1y', index: false, fallthrough: false }));
  router.use(express.static(root, { index: false, maxAge: '1h' }));
  router.get('/{*page}', (_req, res) => {
    res.setHeader('Cache-Control', 'no-cache');
    res.sendFile('index.html', { root });
  });
  return router;
}
