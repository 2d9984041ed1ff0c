/** The API's own page, rendered from the document that the endpoints give. */
import { Router } from 'express';
import swaggerUi from 'swagger-ui-express';
import { apiBase } from '@/shared/endpoint';
import { openApiDocument } from '@/shared/openapi';

/** Inline styles are against the content policy; the page does without them. */
const withoutInlineStyles = (html: string) =>
  html
    .replace(/<style>[\s\S]*?<\/style>/g, '')
    .replace(/<svg ([^>]*) style="[^"]*"/, '<svg $1 width="0" height="0"');

export const openApiPath = `${apiBase}/openapi.json`;

export function docsRouter(): Router {
  const router = Router({ strict: true });
  const html = withoutInlineStyles(
    swaggerUi.generateHTML(undefined, {
      customSiteTitle: 'Driftless API',
      swaggerUrl: openApiPath,
      swaggerOptions: { layout: 'BaseLayout' },
    }),
  );
  router.get('/', (req, res) => {
    // The page names its files relative to its own folder.
    if (req.originalUrl.endsWith('/')) res.type('html').send(html);
    else res.redirect(`${req.baseUrl}/`);
  });
  router.use(swaggerUi.serve);
  return router;
}

export function openApiRouter(): Router {
  const document = openApiDocument();
  return Router().get(openApiPath, (_req, res) => {
    res.json(document);
  });
}
