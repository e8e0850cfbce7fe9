import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readExample } from '../../server/cli/demo-office';
import { calculateMember } from '../../server/engine/calculate-member';
import { memberRepo } from '../../server/features/members/repo';
import { openDesk, signedIn, type Desk } from './desk';

let desk: Desk;
beforeEach(async () => {
  desk = await openDesk();
});
afterEach(() => desk.close());

interface Plank extends Record<string, unknown> {
  title: string;
  supports: unknown[];
  pieces: { z: number }[];
  connections: { rows: number }[];
}

const plank = () => readExample('two-flat-boards.json') as Plank;

/** The nth of a list, which must be there. */
function nth<T>(list: readonly T[], i: number): T {
  const item = list[i];
  if (item === undefined) throw new Error(`nothing at ${i}`);
  return item;
}

describe('who sees what', () => {
  it.each(['ines', 'rolf', 'mira'] as const)('%s sees both projects and their members', async (key) => {
    const agent = await signedIn(desk, key);
    const { body } = await agent.get('/api/projects');
    expect(body.items.map((p: { number: string }) => p.number).sort()).toEqual(['26-011', '26-014']);
    const members = await agent.get('/api/projects/p1/members');
    expect(members.body.items.map((m: { mark: string }) => m.mark)).toEqual(['B1', 'B2', 'B3', 'B4', 'B5']);
    const member = await agent.get('/api/members/m1');
    expect(member.body.may).toEqual({ edit: key === 'rolf' });
    expect(member.body.result.interfaces.length).toBeGreaterThan(0);
  });

  it('somebody on no project sees none, and not even that they exist', async () => {
    const agent = await signedIn(desk, 'odd');
    expect((await agent.get('/api/projects')).body.items).toEqual([]);
    for (const path of ['/api/projects/p1', '/api/projects/p1/members', '/api/members/m1']) {
      const there = await agent.get(path);
      const nowhere = await agent.get(path.replace(/1/g, '99'));
      expect(there.status, path).toBe(404);
      expect(there.body, path).toEqual(nowhere.body);
    }
    const save = await agent.put('/api/members/m1/draft').set('If-Match', '"1"').send({ document: plank() });
    expect(save.status).toBe(404);
  });

  it.each(['ines', 'mira'] as const)('%s may read a draft but not change it', async (key) => {
    const agent = await signedIn(desk, key);
    const refused = await agent
      .put('/api/members/m1/draft')
      .set('If-Match', '"1"')
      .send({ document: plank() });
    expect(refused.status).toBe(403);
    expect(refused.body.code).toBe('not-yours');
    expect((await agent.get('/api/members/m1')).body.version).toBe(1);
  });
});

describe('the list of projects', () => {
  it('is searched, filtered, ordered and told in pages', async () => {
    const agent = await signedIn(desk, 'ines');
    const numbers = async (query: string) =>
      (await agent.get(`/api/projects?${query}`)).body.items.map((p: { number: string }) => p.number);
    expect(await numbers('q=ferry')).toEqual(['26-014']);
    expect(await numbers('q=R4')).toEqual(['26-011']);
    expect(await numbers('q=ferry%20alksk')).toEqual([]);
    expect(await numbers('sort=number')).toEqual(['26-011', '26-014']);
    expect(await numbers('sort=-number')).toEqual(['26-014', '26-011']);
    expect(await numbers('state=signed-off')).toEqual([]);
    expect(await numbers('state=draft&person=mira')).toHaveLength(2);
    expect(await numbers('person=odd')).toEqual([]);
    expect(await numbers('archived=true')).toEqual([]);
    const first = await agent.get('/api/projects?sort=number&limit=1');
    expect(first.body.items).toHaveLength(1);
    const second = await agent.get(`/api/projects?sort=number&limit=1&cursor=${first.body.nextCursor}`);
    expect(second.body.items[0].number).toBe('26-014');
    expect(second.body.nextCursor).toBeNull();
    for (const wrong of ['sort=colour', 'limit=0', 'limit=many', 'cursor=abc', 'state=lost']) {
      expect((await agent.get(`/api/projects?${wrong}`)).status, wrong).toBe(400);
    }
  });
});

describe('a draft', () => {
  it('is saved over the version that was read, and answered with its result', async () => {
    const agent = await signedIn(desk, 'rolf');
    const document = plank();
    nth(document.connections, 0).rows = 3;
    desk.clock.now += 5000;
    const saved = await agent.put('/api/members/m1/draft').set('If-Match', '"1"').send({ document });
    expect(saved.status).toBe(200);
    expect(saved.headers.etag).toBe('"2"');
    expect(saved.body.version).toBe(2);
    expect(saved.body.saved).toEqual({
      at: new Date(desk.clock.now).toISOString(),
      by: { id: 'rolf', name: 'Rolf Amber' },
    });
    const outcome = calculateMember(document);
    if (!outcome.ok) throw new Error(outcome.refusal.message);
    expect(saved.body.result).toEqual(JSON.parse(JSON.stringify(outcome.result)));
    const read = await agent.get('/api/members/m1');
    expect(read.body.document).toEqual(document);
    expect(read.headers.etag).toBe('"2"');
  });

  it('is not saved over somebody else’s: who, when and what differs', async () => {
    const agent = await signedIn(desk, 'rolf');
    const theirs = plank();
    theirs.title = 'Theirs';
    await agent.put('/api/members/m1/draft').set('If-Match', '"1"').send({ document: theirs });
    const mine = plank();
    nth(mine.connections, 0).rows = 4;
    const refused = await agent.put('/api/members/m1/draft').set('If-Match', '"1"').send({ document: mine });
    expect(refused.status).toBe(412);
    expect(refused.body.code).toBe('saved-by-another');
    expect(refused.body.conflict).toMatchObject({ version: 2, saved: { by: { name: 'Rolf Amber' } } });
    expect(refused.body.conflict.paths.sort()).toEqual(['connections.0.rows', 'title']);
    expect((await agent.get('/api/members/m1')).body.title).toBe('Theirs');
    const over = await agent.put('/api/members/m1/draft').set('If-Match', '*').send({ document: mine });
    expect(over.status).toBe(200);
    expect(over.body.version).toBe(3);
  });

  it('is not saved without saying over which version', async () => {
    const agent = await signedIn(desk, 'rolf');
    const missing = await agent.put('/api/members/m1/draft').send({ document: plank() });
    expect(missing.status).toBe(400);
    expect(missing.body.code).toBe('if-match-missing');
    const odd = await agent
      .put('/api/members/m1/draft')
      .set('If-Match', '"seven"')
      .send({ document: plank() });
    expect(odd.status).toBe(412);
  });

  it('that is refused is kept as typed, with its issues, until it is mended', async () => {
    const agent = await signedIn(desk, 'rolf');
    const document = plank();
    nth(document.pieces, 1).z -= 5;
    document.remarkOfMine = 'not a field';
    const kept = await agent.put('/api/members/m1/draft').set('If-Match', '"1"').send({ document });
    expect(kept.status).toBe(200);
    expect(kept.body.result).toBeNull();
    expect(kept.body.refusal).toMatch(/overlap by 5 mm/);
    expect(kept.body.issues[0].path).toBe('pieces.1.z');
    const read = await agent.get('/api/members/m1');
    expect(read.body.document).toEqual(document);
    expect(read.body.outcome).toBe('refused');
    const list = await agent.get('/api/projects/p1/members');
    expect(list.body.items[0]).toMatchObject({ mark: 'B1', outcome: 'refused', utilisation: null });
    const mended = await agent
      .put('/api/members/m1/draft')
      .set('If-Match', '"2"')
      .send({ document: plank() });
    expect(mended.body.issues).toEqual([]);
    expect(mended.body.result).not.toBeNull();
  });

  it('whose result is of another engine version is worked out again when it is read', async () => {
    const repo = memberRepo(desk.database.db);
    repo.keepResult('m1', 1, {
      result: null,
      refusal: JSON.stringify({ code: 'not-available', message: 'an older engine could not', issues: [] }),
      engine: '0.0.1',
      outcome: 'refused',
      utilisation: null,
    });
    const agent = await signedIn(desk, 'mira');
    const read = await agent.get('/api/members/m1');
    expect(read.body.refusal).toBeNull();
    expect(read.body.result.interfaces.length).toBeGreaterThan(0);
    expect(repo.byId('m1')?.engine).not.toBe('0.0.1');
    expect(read.body.version).toBe(1);
  });
});

describe('a calculation', () => {
  it('is what the engine gives, and is kept nowhere', async () => {
    const agent = await signedIn(desk, 'mira');
    const document = readExample('plywood-box.json');
    const answer = await agent.post('/api/calculations').send({ document });
    const outcome = calculateMember(document);
    if (!outcome.ok) throw new Error(outcome.refusal.message);
    expect(answer.status).toBe(200);
    expect(answer.text).toBe(JSON.stringify(outcome.result));
  });

  it('that is refused is a 422 with the issues', async () => {
    const agent = await signedIn(desk, 'mira');
    const document = plank();
    document.supports = [document.supports[0]];
    const answer = await agent.post('/api/calculations').send({ document });
    expect(answer.status).toBe(422);
    expect(answer.body).toMatchObject({ code: 'refused', status: 422, issues: [{ path: 'supports' }] });
    expect(answer.headers['content-type']).toMatch(/application\/problem\+json/);
  });
});
