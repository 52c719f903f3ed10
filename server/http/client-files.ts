import { Router } from 'express';
import expressStaticGzip from 'express-static-gzip';

/** The built client: hashed files for a year, compressed at build time; any page address gets the shell. */
export const clientFiles = (folder: string): Router => {
  const router = Router();
  const files = expressStaticGzip(folder, {
    enableBrotli: true,
    orderPreference: ['br', 'gz'],
    serveStatic: {
      setHeaders: (res, path) => {
        res.setHeader(
          'cache-control',
          path.includes('/assets/') ? 'public, max-age=31536000, immutable' : 'no-cache',
        );
      },
    },
  });
  router.use(files);
  router.get('/{*page}', (req, res, next) => {
    // A missing file is missing: an old tab that asks for a chunk of an earlier build must hear it.
    if (req.path.startsWith('/assets/') || !req.accepts('html')) {
      res.status(404).type('text').send('Not found.');
      return;
    }
    req.url = '/index.html';
    files(req, res, next);
  });
  return router;
};
