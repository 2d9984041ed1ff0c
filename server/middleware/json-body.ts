import express, { type Request, type Response } from 'express';

const parse = express.json({ limit: '100kb' });

/** Reads the body once the caller is known to be allowed: a refused request's body is never looked at. */
export const readJsonBody = (req: Request, res: Response): Promise<void> =>
  new Promise((resolve, reject) => {
    parse(req, res, (error?: unknown) => (error ? reject(error) : resolve()));
  });
