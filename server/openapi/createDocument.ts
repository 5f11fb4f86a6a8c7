import { STATUS_CODES } from 'node:http';
import { errorBodySchema } from '../../shared/schemas/common.js';
import { clientHeaderName } from '../middleware/requireClientHeader.js';
import type { Route } from '../routes/Route.js';
import { SchemaWriter, type JsonObject } from './SchemaWriter.js';

export interface MountedRoutes {
  /** Path under which the rows are mounted: `/api/v1`. */
  prefix: string;
  routes: Route[];
}

const description = [
  'Screens recorded captures for aliasing. Scripts sign in with `POST /api/v1/session` and send `token` as',
  '`Authorization: Bearer`. Changes made with the browser cookie need the header `X-Overfold-Client: web`.',
  'Ids of things the user has no access to answer 404 like missing ones. Every error has the same body;',
  '`code` is stable, `message` is for people.',
].join(' ');

/** `/projects/:projectId` as `/projects/{projectId}`. */
const templatedPath = (path: string): string => path.replace(/:(\w+)/g, '{$1}');

function operationId({ method, path }: Route): string {
  const words = path.split(/[/:.-]+/).filter(Boolean);
  return [method, ...words.map((word) => word.charAt(0).toUpperCase() + word.slice(1))].join('');
}

function parametersOf(route: Route, writer: SchemaWriter): JsonObject[] {
  const fromSchema = (schema: Route['params'], place: 'path' | 'query'): JsonObject[] => {
    if (!schema) return [];
    const { properties = {}, required = [] } = writer.request(schema) as {
      properties?: Record<string, unknown>;
      required?: string[];
    };
    return Object.entries(properties).map(([name, property]) => ({
      name,
      in: place,
      required: place === 'path' || required.includes(name),
      schema: property,
    }));
  };
  const clientHeader = {
    name: clientHeaderName,
    in: 'header',
    required: false,
    description: 'Needed with the cookie; not with a bearer token.',
    schema: { type: 'string', const: 'web' },
  };
  const isCookieWrite = route.access !== 'anyone' && route.method !== 'get';
  return [
    ...fromSchema(route.params, 'path'),
    ...fromSchema(route.query, 'query'),
    ...(isCookieWrite ? [clientHeader] : []),
  ];
}

function requestBodyOf(route: Route, writer: SchemaWriter): JsonObject {
  if (route.bodyType === 'multipart') {
    const fields = Object.entries(route.multipartFields ?? {});
    const properties = fields.map(([name, { description: text, isFile }]) => [
      name,
      isFile
        ? { type: 'array', items: { type: 'string', format: 'binary' }, description: text }
        : { type: 'string', description: text },
    ]);
    const required = fields.filter(([, { isRequired }]) => isRequired).map(([name]) => name);
    const schema = { type: 'object', properties: Object.fromEntries(properties), required };
    return { requestBody: { required: true, content: { 'multipart/form-data': { schema } } } };
  }
  if (!route.body) return {};
  const content = { 'application/json': { schema: writer.request(route.body) } };
  return { requestBody: { required: !route.body.safeParse(undefined).success, content } };
}

/** Error codes by status: those of the row itself, and those that its access and schemas bring. */
function errorsOf(route: Route): Record<string, string> {
  return {
    ...(route.params || route.query || route.body ? { 400: 'INVALID_INPUT' } : {}),
    ...(route.access === 'anyone' ? {} : { 401: 'UNAUTHENTICATED, SESSION_EXPIRED' }),
    ...(route.access === 'admin' ? { 403: 'FORBIDDEN' } : {}),
    ...(route.body ? { 413: 'BODY_TOO_LARGE', 415: 'UNSUPPORTED_MEDIA_TYPE' } : {}),
    ...route.errors,
  };
}

function responsesOf(route: Route, writer: SchemaWriter): JsonObject {
  const { status, schema, contentType, description: text } = route.success;
  const errorContent = { 'application/json': { schema: writer.response(errorBodySchema) } };
  const successContent = schema
    ? { content: { 'application/json': { schema: writer.response(schema) } } }
    : contentType
      ? { content: { [contentType]: { schema: { type: 'string', format: 'binary' } } } }
      : {};
  const errors = Object.entries(errorsOf(route)).map(([code, codes]) => [
    code,
    { description: `${STATUS_CODES[code] ?? 'Error'}: ${codes}`, content: errorContent },
  ]);
  return {
    [status]: { description: text ?? STATUS_CODES[status] ?? 'Success', ...successContent },
    ...Object.fromEntries(errors),
    default: { description: 'Any other error', content: errorContent },
  };
}

function operationOf(route: Route, writer: SchemaWriter): JsonObject {
  return {
    operationId: operationId(route),
    tags: [route.tag],
    summary: route.summary,
    ...(route.description ? { description: route.description } : {}),
    security: route.access === 'anyone' ? [] : [{ bearer: [] }, { cookie: [] }],
    parameters: parametersOf(route, writer),
    ...requestBodyOf(route, writer),
    responses: responsesOf(route, writer),
  };
}

/** The OpenAPI 3.1 document of everything that is mounted: made from the very rows that Express serves. */
export function createDocument(mounted: MountedRoutes[], { version }: { version: string }): JsonObject {
  const writer = new SchemaWriter();
  const paths: Record<string, Record<string, unknown>> = {};
  for (const { prefix, routes } of mounted) {
    for (const route of routes) {
      const path = `${prefix}${templatedPath(route.path)}`;
      paths[path] = { ...paths[path], [route.method]: operationOf(route, writer) };
    }
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Overfold', version, description, license: { name: 'MIT', identifier: 'MIT' } },
    servers: [{ url: '/' }],
    tags: [...new Set(mounted.flatMap(({ routes }) => routes.map(({ tag }) => tag)))].map((name) => ({ name })),
    paths,
    components: {
      schemas: writer.components,
      securitySchemes: {
        bearer: { type: 'http', scheme: 'bearer', bearerFormat: 'JWT' },
        cookie: { type: 'apiKey', in: 'cookie', name: 'overfold_access' },
      },
    },
  };
}
