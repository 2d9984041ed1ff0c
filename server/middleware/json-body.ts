import express, { type Request, type Response } from 'express';

/** Reads the body once the caller is known to be allowed: a refused request's body is never looked at. */
export const readJsonBody = (req: Request, res: Response, limit: number): Promise<void> =>
  new Promise((resolve, reject) => {
    const parse = express.json({ limit });
    parse(req, res, (error?: unknown) => (error ? reject(error) : resolve()));
  });
