/** The web service: API, its documentation, and the web export, on one address. */
import { randomUUID } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import compression from 'compression';
import express, { type Express, type Request, type RequestHandler } from 'express';
import { pinoHttp } from 'pino-http';
import { apiBase } from '@/shared/endpoint';
import { env } from './env';
import { log } from './log';
import { docsRouter, openApiRouter } from './middleware/docs';
import { problems, unknownPath } from './middleware/problem';
import { securityHeaders } from './middleware/security';
import { indexPage, staticFiles } from './middleware/static-web';
import { apiRouter } from './routes';

/** One line a request of the API; never a header, so that no token or cookie is written down. */
const requestLog = pinoHttp({
  logger: log,
  genReqId(_req, res) {
    const id = randomUUID();
    res.setHeader('X-Request-Id', id);
    return id;
  },
  serializers: {
    req: ({ id, method, url }) => ({ id, method, url }),
    res: ({ statusCode }) => ({ statusCode }),
  },
  customLogLevel(req, res) {
    if (res.statusCode >= 500 && res.statusCode !== 503) return 'error';
    const { originalUrl = '' } = req as Partial<Request>;
    const isWork = originalUrl.startsWith(`${apiBase}/`) && !originalUrl.endsWith('/health');
    return isWork ? 'info' : 'debug';
  },
});

const neverStored: RequestHandler = (_req, res, next) => {
  res.set('Cache-Control', 'no-store');
  next();
};

export function createApp(): Express {
  const app = express();
  app.disable('x-powered-by');
  app.use(requestLog, securityHeaders, compression());
  app.use('/api/docs', docsRouter());
  app.use('/api', neverStored);
  app.use(openApiRouter());
  app.use(apiBase, apiRouter());
  app.use('/api', unknownPath);
  app.use(staticFiles(env.webDir));
  app.use(indexPage(env.webDir));
  app.use(problems);
  return app;
}

export const listen = (): Promise<Server> =>
  new Promise((resolve, reject) => {
    const server = createServer(createApp());
    server.once('error', reject);
    server.listen(env.port, env.host, () => {
      log.info({ address: server.address() }, 'listening');
      resolve(server);
    });
  });

/** Answers what was asked already, then closes; idle connections are cut at once. */
export const close = (server: Server): Promise<void> =>
  new Promise((resolve, reject) => {
    server.close((error) => (error ? reject(error) : resolve()));
    server.closeIdleConnections();
  });
