import supertest from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { credentials, openDesk, signedIn, type Desk } from './desk';

// What is expected here is agreed in the description of the HTTP interface: status, code, times.

const minute = 60_000;
const hour = 60 * minute;

let desk: Desk;
beforeEach(async () => {
  desk = await openDesk();
});
afterEach(() => desk.close());

const cookieOf = (answer: supertest.Response): string => String(answer.headers['set-cookie']);
const sessionOf = async (agent: Awaited<ReturnType<typeof signedIn>>) =>
  (await agent.get('/api/session')).body.person;

describe('a session', () => {
  it('begins with address and password, whatever the address’s case', async () => {
    const { email, password } = credentials('rolf');
    const answer = await supertest(desk.app)
      .post('/api/session')
      .send({ email: ` ${email.toUpperCase()} `, password });
    expect(answer.status).toBe(200);
    expect(answer.body.person).toEqual({
      id: 'rolf',
      name: 'Rolf Amber',
      email,
      role: 'staff',
      active: true,
      units: 'metric',
      theme: 'system',
    });
    expect(cookieOf(answer)).toMatch(/HttpOnly/);
    expect(cookieOf(answer)).toMatch(/SameSite=Lax/);
    expect(cookieOf(answer)).not.toMatch(/Secure/);
  });

  it('has a Secure cookie behind TLS', async () => {
    const secure = await openDesk({ publicUrl: 'https://beams.office.example' });
    const answer = await supertest(secure.app).post('/api/session').send(credentials('rolf'));
    expect(cookieOf(answer)).toMatch(/Secure/);
    secure.close();
  });

  it('tells nobody whether an address exists', async () => {
    const known = await supertest(desk.app)
      .post('/api/session')
      .send({ ...credentials('rolf'), password: 'not the right one' });
    const unknown = await supertest(desk.app)
      .post('/api/session')
      .send({ email: 'nobody@office.example', password: 'not the right one' });
    expect(known.status).toBe(401);
    expect(unknown.status).toBe(401);
    expect(unknown.body).toEqual(known.body);
    expect(known.headers['content-type']).toMatch(/application\/problem\+json/);
  });

  it('ends on the server when one signs out', async () => {
    const agent = await signedIn(desk, 'rolf');
    const stolen = cookieOf(await supertest(desk.app).post('/api/session').send(credentials('rolf')));
    expect((await agent.get('/api/projects')).status).toBe(200);
    const other = supertest(desk.app);
    const cookie = stolen.split(';')[0] ?? '';
    expect((await other.delete('/api/session').set('Cookie', cookie)).status).toBe(204);
    expect((await other.get('/api/projects').set('Cookie', cookie)).status).toBe(401);
    expect((await agent.get('/api/projects')).status).toBe(200);
  });

  it('ends after twelve idle hours, and not while it is used', async () => {
    const agent = await signedIn(desk, 'rolf');
    for (let i = 0; i < 4; i += 1) {
      desk.clock.now += 11 * hour;
      expect(await sessionOf(agent)).not.toBeNull();
    }
    desk.clock.now += 12 * hour + minute;
    expect(await sessionOf(agent)).toBeNull();
    expect((await agent.get('/api/projects')).status).toBe(401);
  });

  it('ends after thirty days, used or not', async () => {
    const agent = await signedIn(desk, 'rolf');
    for (let i = 0; i < 71; i += 1) {
      desk.clock.now += 10 * hour;
      expect(await sessionOf(agent)).not.toBeNull();
    }
    desk.clock.now += 11 * hour;
    expect(await sessionOf(agent)).toBeNull();
  });

  it('pauses the account for ten minutes after ten wrong tries, even for the right password', async () => {
    const wrong = { ...credentials('rolf'), password: 'not the right one' };
    for (let i = 0; i < 10; i += 1) {
      expect((await supertest(desk.app).post('/api/session').send(wrong)).status).toBe(401);
    }
    const paused = await supertest(desk.app).post('/api/session').send(credentials('rolf'));
    expect(paused.status).toBe(423);
    expect(paused.body.code).toBe('account-paused');
    expect(Number(paused.headers['retry-after'])).toBe(600);
    desk.clock.now += 10 * minute + 1;
    expect((await supertest(desk.app).post('/api/session').send(credentials('rolf'))).status).toBe(200);
  });

  it('pauses an address that nobody has in the same way, so that neither tells itself apart', async () => {
    const wrong = { email: 'nobody@office.example', password: 'not the right one' };
    for (let i = 0; i < 10; i += 1) {
      expect((await supertest(desk.app).post('/api/session').send(wrong)).status).toBe(401);
    }
    const paused = await supertest(desk.app).post('/api/session').send(wrong);
    expect(paused.status).toBe(423);
    expect(Number(paused.headers['retry-after'])).toBe(600);
    desk.clock.now += 10 * minute + 1;
    expect((await supertest(desk.app).post('/api/session').send(wrong)).status).toBe(401);
  });

  it('forgets wrong tries after a right one', async () => {
    const wrong = { ...credentials('mira'), password: 'not the right one' };
    for (let i = 0; i < 9; i += 1) await supertest(desk.app).post('/api/session').send(wrong);
    await signedIn(desk, 'mira');
    for (let i = 0; i < 9; i += 1) await supertest(desk.app).post('/api/session').send(wrong);
    await signedIn(desk, 'mira');
  });
});

describe('one’s own settings', () => {
  it('are changed one at a time and stay', async () => {
    const agent = await signedIn(desk, 'mira');
    expect((await agent.patch('/api/me').send({ units: 'us' })).body.units).toBe('us');
    expect((await agent.patch('/api/me').send({ theme: 'dark' })).body).toMatchObject({
      units: 'us',
      theme: 'dark',
      name: 'Mira Stone',
    });
    expect(await sessionOf(agent)).toMatchObject({ units: 'us', theme: 'dark' });
    const wrong = await agent.patch('/api/me').send({ units: 'cubits' });
    expect(wrong.status).toBe(422);
    expect(wrong.body.issues[0].path).toBe('units');
  });

  it('hold a password that is long and not common, changed with the old one, ending all other sessions', async () => {
    const agent = await signedIn(desk, 'mira');
    const elsewhere = await signedIn(desk, 'mira');
    const { email, password } = credentials('mira');
    const change = (old: string, next: string) =>
      agent.patch('/api/me').send({ password: { old, new: next } });
    for (const [old, next, path] of [
      ['not the old one', 'a new long password', 'password.old'],
      [password, 'short', 'password.new'],
      [password, 'x'.repeat(129), 'password.new'],
      [password, 'password-1234', 'password.new'],
      [password, 'aaaaaaaaaaaaaaaa', 'password.new'],
    ] as const) {
      const refused = await change(old, next);
      expect(refused.status, next).toBe(422);
      expect(refused.body.issues[0].path, next).toBe(path);
    }
    expect((await change(password, 'a new long password')).status).toBe(200);
    expect(await sessionOf(agent)).not.toBeNull();
    expect(await sessionOf(elsewhere)).toBeNull();
    expect((await supertest(desk.app).post('/api/session').send({ email, password })).status).toBe(401);
    const again = await supertest(desk.app)
      .post('/api/session')
      .send({ email, password: 'a new long password' });
    expect(again.status).toBe(200);
  });
});
