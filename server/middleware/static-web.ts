/** The web export: one page for every address, and files that never change under their name. */
import path from 'node:path';
import express, { type RequestHandler, type Response } from 'express';
import { AppError } from '@/shared/errors';

const yearSeconds = 365 * 24 * 3600;

/** Metro puts a hash of the content into the names in these folders. */
const hashedFolders = [path.join('_expo', 'static'), 'assets'];

export function staticFiles(webDir: string): RequestHandler {
  const isHashed = (file: string) =>
    hashedFolders.some((folder) => file.startsWith(path.join(webDir, folder) + path.sep));
  return express.static(webDir, {
    index: false,
    setHeaders(res: Response, file: string) {
      const lasting = `public, max-age=${yearSeconds}, immutable`;
      res.set('Cache-Control', isHashed(file) ? lasting : 'no-cache');
    },
  });
}

/** An address of the app, such as /quotes/…; a name with an extension is a file that is not there. */
const isPage = (urlPath: string) => path.extname(urlPath) === '';

export const indexPage =
  (webDir: string): RequestHandler =>
  (req, res, next) => {
    if (req.method !== 'GET' && req.method !== 'HEAD') throw new AppError('method-not-allowed');
    if (!isPage(req.path)) throw new AppError('not-found');
    res.set('Cache-Control', 'no-cache');
    res.sendFile('index.html', { root: webDir }, (error?: NodeJS.ErrnoException) => {
      if (error) next(error.code === 'ENOENT' ? new AppError('not-ready') : error);
    });
  };
