import path from 'node:path';
import express, { type NextFunction, type Request, type Response } from 'express';

/** Serves the built web app: hashed assets for good, and its one page for every address that is a place in the app. */
export function serveWebPages(folder: string): express.RequestHandler[] {
  const assets = express.static(folder, {
    index: false,
    setHeaders: (response, file) => {
      const isHashed = path.relative(folder, file).startsWith(`assets${path.sep}`);
      response.setHeader('Cache-Control', isHashed ? 'public, max-age=31536000, immutable' : 'no-cache');
    },
  });
  const page = (request: Request, response: Response, next: NextFunction) => {
    const isPlace = (request.method === 'GET' || request.method === 'HEAD') && !request.path.startsWith('/api/') && path.extname(request.path) === '';
    if (!isPlace) {
      next();
      return;
    }
    response.sendFile('index.html', { root: folder, headers: { 'Cache-Control': 'no-cache' } });
  };
  return [assets, page];
}
