import supertest from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { problemCodes } from '@shared/problem-codes';
import { openDesk, signedIn, type Desk } from './desk';

let desk: Desk;
beforeEach(async () => {
  desk = await openDesk();
});
afterEach(() => desk.close());

interface Layer {
  route?: { path: string; methods: Record<string, boolean>; stack: { method?: string }[] };
  handle?: { stack?: Layer[] };
}

/** Every route of the router tree, below /api. */
function routesOf(layers: readonly Layer[]): { method: string; path: string }[] {
  return layers.flatMap((layer) => {
    if (layer.route) {
      const { path, stack } = layer.route;
      return stack.flatMap(({ method }) => (method === undefined ? [] : [{ method, path }]));
    }
    return routesOf(layer.handle?.stack ?? []);
  });
}

describe('without a session', () => {
  it('every route but health and session answers 401', async () => {
    const router = (desk.app as unknown as { router: { stack: Layer[] } }).router;
    const routes = routesOf(router.stack);
    expect(routes.map((r) => `${r.method} ${r.path}`)).toEqual(
      expect.arrayContaining(['get /projects', 'put /members/:id/draft', 'post /calculations', 'patch /me']),
    );
    const open = new Set(['/health', '/session', '/openapi.json']);
    for (const { method, path } of routes) {
      if (open.has(path)) continue;
      const ask = supertest(desk.app);
      const url = `/api${path.replace(':id', 'm1')}`;
      const requests = {
        get: ask.get(url),
        put: ask.put(url),
        post: ask.post(url),
        patch: ask.patch(url),
        delete: ask.delete(url),
      };
      const request = Object.entries(requests).find(([name]) => name === method)?.[1];
      expect(request, `${method} ${path} is a method this test knows`).toBeDefined();
      const answer = await request?.set('If-Match', '"1"');
      expect(answer?.status, `${method} ${path}`).toBe(401);
    }
  });
});

describe('from another site', () => {
  const send = (headers: Record<string, string>) => supertest(desk.app).delete('/api/session').set(headers);

  it('nothing can be changed', async () => {
    for (const headers of [
      { Origin: 'https://elsewhere.example' },
      { Origin: 'null' },
      { 'Sec-Fetch-Site': 'cross-site' },
      { 'Sec-Fetch-Site': 'same-site' },
    ]) {
      const answer = await send(headers);
      expect(answer.status, JSON.stringify(headers)).toBe(403);
      expect(answer.body.code).toBe('cross-origin');
    }
  });

  it('but from the application itself it can', async () => {
    expect((await send({ Host: 'beams.example', Origin: 'http://beams.example' })).status).toBe(204);
    expect((await send({ 'Sec-Fetch-Site': 'same-origin' })).status).toBe(204);
    const behind = await openDesk({ publicUrl: 'https://beams.office.example' });
    const answer = await supertest(behind.app)
      .delete('/api/session')
      .set('Origin', 'https://beams.office.example');
    expect(answer.status).toBe(204);
    behind.close();
  });
});

describe('a request that cannot be answered', () => {
  it('is a problem with a code of its own', async () => {
    const agent = await signedIn(desk, 'rolf');
    const json = { 'Content-Type': 'application/json' };
    const answers = {
      'malformed-json': agent.post('/api/calculations').set(json).send('{"document":'),
      'unsupported-media': agent.post('/api/calculations').type('form').send({ document: '{}' }),
      'too-large': agent
        .post('/api/calculations')
        .set(json)
        .send(JSON.stringify({ document: { title: 'x'.repeat(5_000_000) } })),
      'not-found': agent.get('/api/nothing/here'),
      'method-not-allowed': agent.delete('/api/projects'),
      'invalid-body': agent.post('/api/calculations').send({ document: 7 }),
    } as const;
    for (const [code, request] of Object.entries(answers)) {
      const answer = await request;
      expect(answer.body.code, code).toBe(code);
      expect(answer.status, code).toBe(problemCodes[code as keyof typeof answers]);
      expect(answer.body.status, code).toBe(answer.status);
      expect(answer.headers['content-type'], code).toMatch(/application\/problem\+json/);
    }
  });

  it('waits when there are too many', async () => {
    const busy = await openDesk({ requestsPerMinute: 3 });
    const ask = () => supertest(busy.app).get('/api/session');
    for (let i = 0; i < 3; i += 1) expect((await ask()).status).toBe(200);
    const late = await ask();
    expect(late.status).toBe(429);
    expect(late.body.code).toBe('slow-down');
    expect(Number(late.headers['retry-after'])).toBeGreaterThan(0);
    busy.close();
  });
});

describe('health', () => {
  it('tells versions, and 503 where the database does not answer', async () => {
    const well = await supertest(desk.app).get('/api/health');
    expect(well.status).toBe(200);
    expect(well.body).toMatchObject({ status: 'ok', version: 'test' });
    const gone = await openDesk();
    gone.close();
    const answer = await supertest(gone.app).get('/api/health');
    expect(answer.status).toBe(503);
    expect(answer.body.code).toBe('database-away');
  });
});
