import { existsSync } from 'node:fs';
import path from 'node:path';
import express, { Router } from 'express';

/** The built app: files as they are, and its page for every address of a view. Names in `assets` carry a hash and never change. */
export function site(folder: string): Router {
  const root = path.resolve(folder);
  const router = Router();
  router.use(
    express.static(root, {
      index: false,
      setHeaders: (response, file) =>
        response.setHeader(
          'Cache-Control',
          file.startsWith(path.join(root, 'assets')) ? 'public, max-age=31536000, immutable' : 'no-cache',
        ),
    }),
  );
  router.get('/{*path}', (request, response, next) => {
    const isFile = /\.\w+$/.test(request.path);
    if (isFile || !request.accepts('html') || !existsSync(path.join(root, 'index.html'))) {
      next();
      return;
    }
    response.setHeader('Cache-Control', 'no-cache');
    response.sendFile('index.html', { root });
  });
  return router;
}
