import { Router } from 'express';
import { type OpenApiDocument, openApiDocument } from '../../contract/openapi.ts';
import type { RouteContext } from '../../middleware/route-context.ts';
import { docsPage } from './docs-page.ts';

/** The description of the API for programs and for people. Made once, when somebody first asks. */
export function docsRoutes({ ctx }: RouteContext): Router {
  const router = Router();
  let made: OpenApiDocument | undefined;
  const description = () => (made ??= openApiDocument(ctx.config.address));
  router.get('/openapi.json', (_req, res) => {
    res.json(description());
  });
  router.get('/docs', (_req, res) => {
    res.type('html').send(docsPage(description()));
  });
  return router;
}
