import { Router } from 'express';
import { openApiDocument } from './describe-endpoints.ts';
import { docsPage } from './docs-page.ts';

/** Version of the interface below /api/v1. */
const version = '1.0.0';

/** The description of the interface, for programs and for people; both made once, from the contract. */
export function describeApi(): Router {
  const document = openApiDocument(version);
  const page = docsPage(document);
  const router = Router();
  router.get('/api/v1/openapi.json', (_req, res) => {
    res.set('cache-control', 'no-cache').json(document);
  });
  router.get('/api/docs', (_req, res) => {
    res.set('cache-control', 'no-cache').type('html').send(page);
  });
  return router;
}
