import path from 'node:path';
import express, {type RequestHandler, Router} from 'express';
import {AppError} from '../errors';

/** Names with a hash of their content in them: they never change. */
const HASHED = /-[A-Z0-9]{8}\.\w+$/;

/** Serves the built client; every address that is no file of it is a page of the app. */
export function serveClient(folder: string): Router {
  const router = Router();
  router.use(
    express.static(folder, {
      index: false,
      redirect: false,
      setHeaders: (res, file) => {
        const isHashed = HASHED.test(path.basename(file));
        res.setHeader(
          'Cache-Control',
          isHashed ? 'public, max-age=31536000, immutable' : 'no-cache',
        );
      },
    }),
  );
  router.use(pageOfApp(folder));
  return router;
}

function pageOfApp(folder: string): RequestHandler {
  return (req, res, next) => {
    const isFileWanted = path.extname(req.path) !== '';
    if ((req.method !== 'GET' && req.method !== 'HEAD') || isFileWanted) {
      throw new AppError('not-found', {detail: `There is no ${req.path}.`});
    }
    res.set('Cache-Control', 'no-cache');
    res.sendFile('index.html', {root: folder, cacheControl: false}, (error?: Error) => {
      const {code} = Object(error) as {code?: unknown};
      if (!error || code === 'ECONNABORTED') return; // the reader left
      next(
        code === 'ENOENT'
          ? new AppError('unavailable', {detail: 'The pages are not built.'})
          : error,
      );
    });
  };
}
