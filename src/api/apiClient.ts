import { errorBodySchema } from '@shared/schemas/common.js';
import { ApiError } from './ApiError';

export const apiRoot = '/api/v1';
/** Cookie-authenticated writes must carry it: a foreign page can't set it. */
export const clientHeader = { 'X-Overfold-Client': 'web' } as const;

type Query = Record<string, string | number | boolean | undefined | null>;

interface RequestOptions {
  query?: Query;
  body?: unknown;
  signal?: AbortSignal;
}

let onSessionLost: () => void = () => undefined;
/** What happens when a session can't be renewed; set once by the router. */
export function handleSessionLost(handler: () => void): void {
  onSessionLost = handler;
}

export function buildUrl(path: string, query: Query = {}): string {
  const parameters = new URLSearchParams();
  for (const [key, value] of Object.entries(query)) {
    if (value !== undefined && value !== null && value !== '') parameters.set(key, String(value));
  }
  const text = parameters.toString();
  return `${apiRoot}${path}${text ? `?${text}` : ''}`;
}

/** The error of an answer, whatever came: a proxy's page is no reason to fail on reading it. */
export function toApiError(status: number, text: string): ApiError {
  try {
    const parsed = errorBodySchema.safeParse(JSON.parse(text));
    if (parsed.success) return new ApiError(status, parsed.data.error);
  } catch {
    // Not JSON: the generic message below says all that is known.
  }
  return new ApiError(status, {
    code: 'UNEXPECTED_ANSWER',
    message: `The server answered with status ${status}.`,
    requestId: '',
  });
}

function send(method: string, path: string, { query, body, signal }: RequestOptions): Promise<Response> {
  return fetch(buildUrl(path, query), {
    method,
    credentials: 'same-origin',
    headers: {
      Accept: 'application/json',
      ...clientHeader,
      ...(body === undefined ? {} : { 'Content-Type': 'application/json' }),
    },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    ...(signal ? { signal } : {}),
  }).catch((error: unknown) => {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new ApiError(0, {
      code: 'UNREACHABLE',
      message: 'The server can’t be reached. Check the connection and try again.',
      requestId: '',
    });
  });
}

let renewal: Promise<boolean> | null = null;

/** Renews the session once for all requests that wait for it. */
export function renewSession(): Promise<boolean> {
  renewal ??= send('POST', '/session/renewal', { body: {} })
    .then((response) => response.ok)
    .catch(() => false)
    .finally(() => {
      renewal = null;
    });
  return renewal;
}

const mayRenew = (path: string): boolean => !path.startsWith('/session/renewal') && !path.startsWith('/passwords');

async function request<T>(method: string, path: string, options: RequestOptions = {}): Promise<T> {
  let response = await send(method, path, options);
  if (response.status === 401 && mayRenew(path) && !(method === 'POST' && path === '/session')) {
    if (await renewSession()) response = await send(method, path, options);
    else if (path !== '/session') onSessionLost();
  }
  const text = await response.text();
  if (!response.ok) throw toApiError(response.status, text);
  // The caller names the type that the contract gives this route; the server is tested against the same schemas.
  return (text === '' ? undefined : JSON.parse(text)) as T;
}

/** The one way to the API: JSON in and out, errors as ApiError, an expired session renewed once. */
export const apiClient = {
  get: <T>(path: string, query?: Query, signal?: AbortSignal): Promise<T> =>
    request<T>('GET', path, { ...(query ? { query } : {}), ...(signal ? { signal } : {}) }),
  post: <T>(path: string, body?: unknown): Promise<T> => request<T>('POST', path, { body: body ?? {} }),
  put: <T>(path: string, body: unknown): Promise<T> => request<T>('PUT', path, { body }),
  patch: <T>(path: string, body: unknown): Promise<T> => request<T>('PATCH', path, { body }),
  delete: <T = void>(path: string): Promise<T> => request<T>('DELETE', path),
};
