import type { ChangeMe, Person } from '@shared/schemas/api';
import { may } from '@shared/roles';
import { HttpProblem } from '../../http/problems';
import type { Sessions } from './lucia';
import { compareWithNobody, hashPassword, isCommon, passwordMatches } from './passwords';
import type { PersonRow, SessionRepo } from './repo';

const minute = 60_000;
const hour = 60 * minute;
const rules = {
  idle: 12 * hour,
  longest: 30 * 24 * hour,
  tries: 10,
  pause: 10 * minute,
  touchEvery: minute,
  strangers: 10_000,
};

export interface SessionService {
  cookieName: string;
  signIn: (email: string, password: string) => Promise<{ id: string; person: Person }>;
  /** who a session id belongs to; null where it has ended */
  resolve: (id: string) => Promise<Person | null>;
  signOut: (id: string) => Promise<void>;
  /** changes one's own settings; a new password ends all other sessions and begins a new one */
  changeMe: (person: Person, change: ChangeMe) => Promise<{ person: Person; newSession: string | null }>;
}

export function personOf(row: PersonRow): Person {
  const { id, name, email, role, active, units, theme } = row;
  return { id, name, email, role, active, units, theme };
}

export function sessionService(deps: {
  repo: SessionRepo;
  sessions: Sessions;
  clock: () => number;
}): SessionService {
  const { repo, sessions, clock } = deps;

  const wrong = (): HttpProblem =>
    new HttpProblem('wrong-credentials', 'The e-mail address and the password do not go together.');

  /** Addresses nobody has are counted and paused like those of people, or the answer would tell them apart. */
  const strangers = new Map<string, { wrongTries: number; pausedUntil: number | null }>();
  const countStranger = (address: string, now: number): void => {
    if (strangers.size >= rules.strangers) strangers.clear();
    const tries = (strangers.get(address)?.wrongTries ?? 0) + 1;
    const paused = tries >= rules.tries;
    strangers.set(address, {
      wrongTries: paused ? 0 : tries,
      pausedUntil: paused ? now + rules.pause : null,
    });
  };

  const refuseWhilePaused = (row: Pick<PersonRow, 'pausedUntil'>, now: number): void => {
    if (row.pausedUntil === null || row.pausedUntil <= now) return;
    const seconds = Math.ceil((row.pausedUntil - now) / 1000);
    throw new HttpProblem(
      'account-paused',
      'After ten wrong tries the account is paused for ten minutes. Wait, then try again.',
      { retryAfter: seconds },
    );
  };

  return {
    cookieName: sessions.cookieName,
    signIn: async (email, password) => {
      const now = clock();
      const row = repo.byEmail(email);
      if (!row?.active) {
        const address = email.trim().toLowerCase();
        refuseWhilePaused(strangers.get(address) ?? { pausedUntil: null }, now);
        await compareWithNobody(password);
        countStranger(address, now);
        throw wrong();
      }
      refuseWhilePaused(row, now);
      if (!(await passwordMatches(row.passwordHash, password))) {
        // Read again: tries may have been counted while the password was compared.
        const tries = (repo.byId(row.id)?.wrongTries ?? row.wrongTries) + 1;
        const paused = tries >= rules.tries;
        repo.update(row.id, {
          wrongTries: paused ? 0 : tries,
          pausedUntil: paused ? now + rules.pause : null,
        });
        throw wrong();
      }
      repo.update(row.id, { wrongTries: 0, pausedUntil: null });
      return { id: await sessions.create(row.id, now), person: personOf(row) };
    },
    resolve: async (id) => {
      const session = await sessions.find(id);
      if (!session) return null;
      const now = clock();
      const row = repo.byId(session.personId);
      const ended = now - session.usedAt > rules.idle || now - session.startedAt > rules.longest;
      if (ended || !row?.active) {
        await sessions.end(id);
        return null;
      }
      if (now - session.usedAt > rules.touchEvery) repo.touch(id, now);
      return personOf(row);
    },
    signOut: (id) => sessions.end(id),
    changeMe: async (person, change) => {
      if (!may(person, 'change-own-settings', null))
        throw new HttpProblem('not-yours', 'Only you may change this.');
      const row = repo.byId(person.id);
      if (!row) throw new HttpProblem('not-signed-in', 'Sign in first.');
      let passwordHash: string | null = null;
      if (change.password) {
        refuseWhilePaused(row, clock());
        if (!(await passwordMatches(row.passwordHash, change.password.old))) {
          const message = 'This is not your present password.';
          throw new HttpProblem('invalid-body', message, { issues: [{ path: 'password.old', message }] });
        }
        if (isCommon(change.password.new)) {
          const message = 'This password is on every list of common ones: choose another.';
          throw new HttpProblem('invalid-body', message, { issues: [{ path: 'password.new', message }] });
        }
        passwordHash = await hashPassword(change.password.new);
      }
      repo.update(row.id, {
        ...(change.name === undefined ? {} : { name: change.name }),
        ...(change.units === undefined ? {} : { units: change.units }),
        ...(change.theme === undefined ? {} : { theme: change.theme }),
        ...(passwordHash === null ? {} : { passwordHash }),
      });
      let newSession: string | null = null;
      if (passwordHash !== null) {
        await sessions.endAllOf(row.id);
        newSession = await sessions.create(row.id, clock());
      }
      return { person: personOf(repo.byId(row.id) ?? row), newSession };
    },
  };
}
