import { existsSync } from 'node:fs';
import path from 'node:path';
import { Router, static as serveStatic } from 'express';
import { NotFoundError } from '../errors/index.js';

/** The built client; every other address of a page gets index.html, so that deep links work. */
export function serveClient(clientDir: string): Router {
  const router = Router();
  const indexFile = path.join(clientDir, 'index.html');
  router.use(
    '/assets',
    // Names carry a hash of the content.
    serveStatic(path.join(clientDir, 'assets'), { immutable: true, maxAge: '1y', index: false, redirect: false }),
  );
  router.use(serveStatic(clientDir, { index: false, redirect: false, dotfiles: 'ignore', maxAge: '1h' }));
  router.get('/{*page}', (req, res, next) => {
    // A missing file must not answer 200 with a page: only addresses without an extension are pages.
    const isPage = !req.path.startsWith('/assets/') && path.extname(req.path) === '';
    if (!isPage) throw new NotFoundError('NO_SUCH_FILE', 'There is no such file.');
    if (!existsSync(indexFile)) {
      throw new NotFoundError('CLIENT_NOT_BUILT', 'The client has not been built. Run: npm run build:client');
    }
    res.set('Cache-Control', 'no-cache');
    res.sendFile(indexFile, (error) => {
      if (error) next(error);
    });
  });
  return router;
}
