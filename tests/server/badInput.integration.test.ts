import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import type { TestMethod } from '../support/testApp.js';
import type { AppDependencies } from '../../server/AppDependencies.js';
import { parseConfig } from '../../server/config/config.js';
import { createRoutes } from '../../server/routes/index.js';
import type { Route } from '../../server/routes/Route.js';
import { buildProject } from '../support/factories/buildProject.js';
import { buildUser } from '../support/factories/buildUser.js';
import { errorOf } from '../support/errorOf.js';
import { createTestApp, type TestApp, type TestClient } from '../support/testApp.js';

let app: TestApp;
let client: TestClient;
let projectId: string;

beforeAll(async () => {
  app = await createTestApp({ config: { SIGN_IN_ATTEMPTS_PER_15_MIN: 100_000 } });
  client = await app.as(await buildUser(app.deps.dataSource, { isAdmin: true }));
  projectId = (await buildProject(app.deps.dataSource)).id;
});
afterAll(() => app.close());

/** Only to know the rows before the first test: they are the same for every set of dependencies. */
const config = parseConfig({
  DATABASE_URL: 'postgres://nowhere',
  REDIS_URL: 'redis://nowhere',
  SMTP_URL: 'smtp://nowhere',
  JWT_SECRET: 'x'.repeat(32),
  BCRYPT_COST: '4',
});
const routes: Route[] = createRoutes({ config } as AppDependencies);
const nameOf = ({ method, path }: Route): string => `${method.toUpperCase()} ${path}`;

const hostileValues: [string, unknown][] = [
  ['null', null],
  ['a number', -1e308],
  ['a very long text', 'a'.repeat(50_000)],
  ['SQL', "x'; select pg_sleep(3); --"],
  ['a NUL character', 'a\u0000b'],
  ['a list', [1, [2]]],
  ['an object', { $gt: '' }],
  ['a truth value', true],
];

const fill = (route: Route, id: string): string => route.path.replace(/:projectId/, projectId).replace(/:\w+/g, id);

function propertiesOf(schema: z.ZodType | undefined): string[] {
  if (!schema) return [];
  const { properties = {} } = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' });
  return Object.keys(properties);
}

const send = (route: Route, path: string, body?: object) => {
  const test = client[route.method as TestMethod](path);
  return body ? test.send(body) : test;
};

describe.each(routes.filter(({ body }) => body).map((route) => [nameOf(route), route] as const))(
  '%s',
  (_name, route) => {
    const names = propertiesOf(route.body);

    it.each(hostileValues)('answers %s for any of its values with a 4xx, and at once', async (_kind, value) => {
      for (const name of names) {
        const startedMs = performance.now();
        const response = await send(route, fill(route, randomUUID()), { [name]: value });
        expect(performance.now() - startedMs).toBeLessThan(2_000);
        if (response.status >= 400) expect(errorOf(response).status).toBeLessThan(500);
      }
      expect(names.length).toBeGreaterThan(0);
    });

    it('refuses a name that it does not know, and names it', async () => {
      const response = await send(route, fill(route, randomUUID()), { isAdmin2: true, projectId2: randomUUID() });
      expect(errorOf(response)).toEqual({ status: 400, code: 'INVALID_INPUT' });
      const places = response.body.error.details.map(({ path }: { path: string }) => path);
      expect(places).toEqual(expect.arrayContaining(['body.isAdmin2', 'body.projectId2']));
    });

    it.each(['[]', '"text"', '1', 'null', '{"__proto__":{"isAdmin":true}}', '{"constructor":{"prototype":{}}}'])(
      'refuses the body %s',
      async (text) => {
        const response = await client[route.method as TestMethod](fill(route, randomUUID()))
          .set('Content-Type', 'application/json')
          .send(text);
        expect(errorOf(response).status).toBe(400);
      },
    );
  },
);

describe.each(routes.filter(({ params }) => params).map((route) => [nameOf(route), route] as const))(
  '%s',
  (_name, route) => {
    it.each(["1'%20or%20'1", '%00', '..%2f..', 'a'.repeat(3000), '-1', 'NaN'])('refuses the id %s', async (id) => {
      const path = route.path.replace(/:\w+/g, id);
      const response = await send(route, path);
      expect([400, 404]).toContain(errorOf(response).status);
    });
  },
);

describe.each(routes.filter(({ method }) => method === 'get').map((route) => [nameOf(route), route] as const))(
  '%s',
  (_name, route) => {
    const path = fill(route, randomUUID());

    it('refuses a query name that it does not know', async () => {
      const response = await send(route, `${path}?nope=1`);
      expect(errorOf(response)).toEqual({ status: 400, code: 'INVALID_INPUT' });
      expect(response.body.error.details).toContainEqual(expect.objectContaining({ path: 'query.nope' }));
    });

    it('refuses a query name that comes twice', async () => {
      for (const name of [...propertiesOf(route.query), 'nope']) {
        const response = await send(route, `${path}?${name}=1&${name}=2`);
        expect(errorOf(response)).toEqual({ status: 400, code: 'INVALID_INPUT' });
      }
    });

    it.each(['-1', 'NaN', '1e999', '%00', "(case when 1=1 then 'a' end)", 'asc;select pg_sleep(3)', 'a'.repeat(4000)])(
      'answers the query value %s with anything but a fault, at once',
      async (value) => {
        const startedMs = performance.now();
        for (const name of propertiesOf(route.query)) {
          const response = await send(route, `${path}?${name}=${encodeURIComponent(value)}`);
          expect(response.status).toBeLessThan(500);
        }
        expect(performance.now() - startedMs).toBeLessThan(2_500);
      },
    );
  },
);
