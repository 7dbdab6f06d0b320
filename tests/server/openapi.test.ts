/** The description of the API is complete and true, and the edges of HTTP answer in the same words everywhere. */
import type { Response } from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import { freePort } from '../../scripts/lib/ports.mjs';
import { connectDatabase } from '../../server/db/sequelize.ts';
import { allRoutes } from '../../server/features/all-routes.ts';
import { databaseHealth } from '../../server/http/health.ts';
import { problem } from '../../shared/contracts/common.ts';
import { errorCodes } from '../../shared/contracts/errors.ts';
import { health } from '../../shared/contracts/health.ts';
import { startTestApp, testPassword, type TestApp } from '../support/app.ts';
import { aPoint, aProbe, aSite, installed } from '../support/rows.ts';

/** The models follow the newest connection, so that each group of tests starts an application and stops it. */
function withApp(environment: Record<string, string> = {}): () => TestApp {
  let app: TestApp;
  beforeAll(async () => {
    app = await startTestApp(environment);
  });
  afterAll(() => app.stop());
  return () => app;
}

interface Parameter {
  name: string;
  in: 'path' | 'query';
  required: boolean;
  schema: object;
}
interface Content {
  content?: Record<string, { schema: Record<string, unknown> }>;
}
interface Operation {
  operationId: string;
  summary: string;
  security: object[];
  parameters: Parameter[];
  requestBody?: Content & { required: boolean };
  responses: Record<string, Content & { description: string }>;
}
interface Description {
  openapi: string;
  paths: Record<string, Record<string, Operation>>;
  components: {
    schemas: Record<string, { description: string }>;
    securitySchemes: Record<string, { name: string }>;
  };
}

const answerSchema = (operation: Operation, status: string): Record<string, unknown> =>
  operation.responses[status]?.content?.['application/json']?.schema ?? {};

describe('the description at /api/openapi.json', () => {
  const app = withApp();
  let description: Description;
  beforeAll(async () => {
    description = (await app().nobody().get('/api/openapi.json').expect(200)).body as Description;
  });
  const templateOf = (path: string): string => path.replace(/:([A-Za-z]+)/g, '{$1}');
  const operationOf = (verb: string, path: string): Operation =>
    description.paths[templateOf(path)]?.[verb] as Operation;

  it('is OpenAPI 3.1 and says how to sign in', () => {
    expect(description.openapi).toBe('3.1.0');
    expect(description.components.securitySchemes['session']?.name).toBe('saltmark.sid');
  });

  it('holds every route and nothing that is not mounted', () => {
    const told = Object.entries(description.paths).flatMap(([path, verbs]) =>
      Object.keys(verbs).map((verb) => `${verb} ${path}`),
    );
    const mounted = allRoutes.map(({ verb, path }) => `${verb} ${templateOf(path)}`);
    expect(told.toSorted()).toEqual([...mounted, 'get /api/health'].toSorted());
    const names = Object.values(description.paths).flatMap((verbs) =>
      Object.values(verbs).map(({ operationId }) => operationId),
    );
    expect(new Set(names).size).toBe(names.length);
  });

  it.each(allRoutes.map((spec) => [`${spec.verb} ${spec.path}`, spec] as const))(
    'describes %s: what it takes, what it answers, how it refuses',
    (_name, spec) => {
      const operation = operationOf(spec.verb, spec.path);
      expect(operation.summary).toMatch(/^[A-Z].*[.:]/);
      expect(operation.security).toEqual(spec.access === 'session' ? [{ session: [] }] : []);

      const inPath = operation.parameters.filter((one) => one.in === 'path');
      const names = [...spec.path.matchAll(/:([A-Za-z]+)/g)].map((match) => match[1]);
      expect(inPath.map(({ name }) => name)).toEqual(names);
      for (const parameter of operation.parameters)
        expect(Object.keys(parameter.schema).length).toBeGreaterThan(0);
      expect(inPath.every(({ required }) => required)).toBe(true);
      const inQuery = operation.parameters.filter((one) => one.in === 'query');
      expect(inQuery.length > 0).toBe(spec.query !== undefined);

      expect(operation.requestBody !== undefined).toBe(spec.body !== undefined || spec.bytes !== undefined);
      if (spec.bytes)
        expect(Object.keys(operation.requestBody?.content ?? {})).toEqual([...spec.bytes.mediaTypes]);
      if (spec.body) {
        const schema = operation.requestBody?.content?.['application/json']?.schema ?? {};
        expect(Object.keys(schema)).toEqual(
          expect.arrayContaining([expect.stringMatching(/^(type|oneOf|anyOf|allOf)$/)]),
        );
      }
      const status = spec.answer || spec.sends ? String(spec.status ?? 200) : '204';
      expect(Object.keys(operation.responses).toSorted()).toEqual([status, 'default'].toSorted());
      if (spec.answer) expect(answerSchema(operation, status)).not.toEqual({});
      if (spec.sends)
        expect(Object.keys(operation.responses[status]?.content ?? {})).toEqual([...spec.sends]);
      expect(operation.responses['default']?.content?.['application/problem+json']?.schema).toEqual({
        $ref: '#/components/schemas/Problem',
      });
    },
  );

  it('names every refusal code', () => {
    const told = description.components.schemas['Problem']?.description ?? '';
    for (const code of Object.keys(errorCodes)) expect(told).toContain(code);
  });

  it('tells the truth: a real list of probes fits its schema, and a spoilt one does not', async () => {
    const site = await aSite();
    await installed(await aProbe(site.id), await aPoint(site.id), (await app().person('manager')).id);
    const manager = await app().as('manager');
    const { body } = await manager.get('/api/probes').expect(200);
    expect(body.items).toHaveLength(1);
    const schema = z.fromJSONSchema(answerSchema(operationOf('get', '/api/probes'), '200') as never);
    expect(schema.safeParse(body).error).toBeUndefined();
    const spoilt = { ...body, items: [{ ...body.items[0], cellConstantPerCm: 'one' }] };
    expect(schema.safeParse(spoilt).success).toBe(false);
  });
});

describe('/api/health', () => {
  const app = withApp();

  it('answers 200 while every part is up, to anybody', async () => {
    app().parts.health.push(databaseHealth(app().parts));
    const answer = await app().nobody().get('/api/health');
    expect(answer.status).toBe(200);
    expect(health.parse(answer.body)).toEqual({ status: 'ok', parts: { database: { up: true } } });
  });

  it('answers 503 naming the part that is down', async () => {
    const gone = connectDatabase(`postgresql://nobody@127.0.0.1:${await freePort()}/gone`, {
      maxConnections: 1,
    });
    app().parts.health.push({ ...databaseHealth({ sequelize: gone }), name: 'archive' });
    const answer = await app().nobody().get('/api/health');
    await gone.close();
    expect(answer.status).toBe(503);
    const told = health.parse(answer.body);
    expect(told.status).toBe('failing');
    expect(told.parts['database']).toEqual({ up: true });
    expect(told.parts['archive']).toMatchObject({ up: false });
    expect(told.parts['archive']?.detail).toMatch(/./);
  });
});

describe('/metrics', () => {
  const token = 'known-to-the-collector';
  const app = withApp({ METRICS_TOKEN: token });
  const ask = (headers: Record<string, string>) => app().nobody().get('/metrics').set(headers);
  /** Through a proxy the request is no longer from this machine. */
  const fromOutside = { 'x-forwarded-for': '203.0.113.7' };

  it('is read on the machine itself, as Prometheus text', async () => {
    const answer = await ask({}).expect(200);
    expect(answer.type).toBe('text/plain');
    expect(answer.text).toMatch(/^saltmark_readings_stored_total \d+$/m);
  });

  it('is read from outside with the token only', async () => {
    await ask({ ...fromOutside, authorization: `Bearer ${token}` }).expect(200);
    expect((await ask(fromOutside)).body).toMatchObject({ code: 'request.not-found', status: 404 });
    expect((await ask({ ...fromOutside, authorization: 'Bearer guessed' })).status).toBe(404);
  });
});

describe('the edges of HTTP', () => {
  const app = withApp();
  const isProblem = (answer: Response, code: string, status: number): void => {
    expect(answer.status).toBe(status);
    expect(answer.type).toBe('application/problem+json');
    expect(problem.parse(answer.body)).toMatchObject({ code, status });
    expect(answer.body.requestId).toMatch(/^[0-9a-f-]{36}$/);
  };

  it('answers an unknown address under /api with problem details', async () => {
    isProblem(await app().nobody().get('/api/no-such-slice'), 'request.not-found', 404);
    isProblem(await (await app().as('administrator')).put('/api/sites').send({}), 'request.not-found', 404);
  });

  it('refuses a body that is too large, before anybody is asked to sign in', async () => {
    const answer = await app()
      .nobody()
      .post('/api/sites')
      .send({ name: 'x'.repeat(300 * 1024) });
    isProblem(answer, 'request.too-large', 400);
  });

  it.each([
    ['broken JSON', 'application/json', '{"email": '],
    ['a form', 'application/x-www-form-urlencoded', 'email=a%40plant.example'],
    ['plain text', 'text/plain', '{"email":"a@plant.example"}'],
  ])('refuses %s with the reason', async (_what, type, body) => {
    isProblem(await app().nobody().post('/api/sessions').type(type).send(body), 'request.unparsable', 400);
  });

  it.each([
    ['another site, by the browser’s own word', { 'sec-fetch-site': 'cross-site' }],
    ['a neighbour on the same domain', { 'sec-fetch-site': 'same-site' }],
    ['a foreign origin', { origin: 'https://elsewhere.example' }],
    ['an origin that hides itself', { origin: 'null' }],
  ])('refuses a write from %s, and changes nothing', async (_where, headers) => {
    const administrator = await app().as('administrator');
    const before = await app().auditCount();
    const body = { code: 'FORGED', name: 'Forged', timeZone: 'Europe/London' };
    isProblem(
      await administrator.post('/api/sites').set(headers).send(body),
      'request.forgery-suspected',
      403,
    );
    expect(await app().auditCount()).toBe(before);
    expect((await administrator.get('/api/sites')).body.total).toBe(0);
  });

  it('sends the strict headers with pages and answers', async () => {
    for (const path of ['/api/health', '/api/no-such-slice']) {
      const { headers } = await app().nobody().get(path);
      const policy = String(headers['content-security-policy']);
      expect(policy).toContain("default-src 'none'");
      expect(policy).toContain("script-src 'self'");
      expect(policy).toContain("frame-ancestors 'none'");
      expect(policy).not.toMatch(/unsafe-(inline|eval)|upgrade-insecure-requests/);
      expect(headers['x-content-type-options']).toBe('nosniff');
      expect(headers['x-frame-options']).toBe('SAMEORIGIN');
      expect(headers['referrer-policy']).toBe('same-origin');
      expect(headers['cache-control']).toBe('no-store');
      expect(headers).not.toHaveProperty('x-powered-by');
      // Over plain http it would lock people out of a machine on the plant's own network.
      expect(headers).not.toHaveProperty('strict-transport-security');
    }
  });
});

describe('many sign-in attempts from one address', () => {
  const app = withApp();

  it('are refused after thirty that failed, even with the right password then', async () => {
    const { email } = await app().person('operator');
    const attempts = Array.from({ length: 30 }, (_, index) => ({
      email: `guess-${index}@plant.example`,
      password: 'guessed',
    }));
    const right = { email, password: testPassword };
    const signIn = (body: object) => app().nobody().post('/api/sessions').send(body);
    expect((await signIn(right)).status).toBe(201);
    for (const attempt of attempts) expect((await signIn(attempt)).status).toBe(401);

    const refused = await signIn(right);
    expect(refused.status).toBe(429);
    expect(refused.body).toMatchObject({ code: 'sessions.too-many', status: 429 });
    expect(Number(refused.get('retry-after'))).toBeGreaterThan(0);
    expect(refused.get('set-cookie')).toBeUndefined();
  });
});

describe('behind TLS', () => {
  const app = withApp({ PUBLIC_URL: 'https://saltmark.plant.example', TRUST_PROXY: '1' });

  it('the session cookie is Secure and browsers are told to stay with TLS', async () => {
    const { email } = await app().person('operator');
    const answer = await app()
      .nobody()
      .post('/api/sessions')
      .set('x-forwarded-proto', 'https')
      .send({ email, password: testPassword });
    expect(answer.status).toBe(201);
    const [cookie] = answer.get('set-cookie') as unknown as string[];
    expect(cookie).toMatch(/; Secure/);
    expect(cookie).toMatch(/; HttpOnly/);
    expect(cookie).toMatch(/; SameSite=Lax/);
    expect(answer.get('strict-transport-security')).toMatch(/max-age=\d{6,}/);
    expect(answer.get('content-security-policy')).toContain("connect-src 'self' wss:");
  });

  it('no session leaves over plain http', async () => {
    const { email } = await app().person('operator');
    const answer = await app().nobody().post('/api/sessions').send({ email, password: testPassword });
    expect(answer.get('set-cookie')).toBeUndefined();
  });
});
