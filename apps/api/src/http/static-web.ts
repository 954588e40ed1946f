import path from 'node:path';
import express, { Router } from 'express';

/** The built web application: hashed assets are immutable, every other path is the page itself. */
export function staticWeb(folder: string): Router {
  const root = path.resolve(folder);
  const router = Router();
  router.use(
    '/assets',
    express.static(path.join(root, 'assets'), { immutable: true, maxAge: '1y', fallthrough: false }),
  );
  router.use(express.static(root, { index: false, maxAge: 0 }));
  router.get('/{*path}', (_req, res) => {
    res.set('cache-control', 'no-cache').sendFile('index.html', { root });
  });
  return router;
}
