import type { RequestHandler } from 'express';
import swaggerUi from 'swagger-ui-express';
import type { JsonObject } from './SchemaWriter.js';

/** A readable page of the document; all its files come from here, and it runs under the content security policy. */
export function serveDocs(document: JsonObject): RequestHandler[] {
  const options = {
    customSiteTitle: 'Overfold API',
    // The page would otherwise ask a host on the internet whether the document is valid.
    swaggerOptions: { validatorUrl: null, docExpansion: 'list', defaultModelsExpandDepth: 0 },
  };
  return [...swaggerUi.serveFiles(document, options), swaggerUi.setup(document, options)];
}
