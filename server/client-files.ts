/** The built web client. A path with an extension that is not there is 404; any other address is the client's own. */
import express, { type RequestHandler } from 'express';
import path from 'node:path';
import { notFound } from './errors';

const A_YEAR = 'public, max-age=31536000, immutable';
/** The export names these by their content. */
const HASHED = /[\\/](_expo[\\/]static|assets)[\\/]/;

export function serveClient(clientDir: string): RequestHandler[] {
  const page = path.join(clientDir, 'index.html');
  const files = express.static(clientDir, {
    index: false,
    setHeaders: (res, file) => res.setHeader('Cache-Control', HASHED.test(file) ? A_YEAR : 'no-cache'),
  });
  const fallback: RequestHandler = (req, res, next) => {
    if (req.method !== 'GET' && req.method !== 'HEAD') throw notFound(`Nothing answers ${req.method} here.`);
    if (path.extname(req.path)) throw notFound(`There is no file ${req.path}.`);
    res.setHeader('Cache-Control', 'no-cache');
    res.sendFile(page, (error?: Error) => {
      if (error && !res.headersSent) next(notFound('The web client is not built: npm run build makes it.'));
    });
  };
  return [files, fallback];
}
