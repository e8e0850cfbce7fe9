import { hash, verify } from '@node-rs/argon2';

/** argon2id, 19 MiB, two passes, one lane (OWASP's password storage advice). */
const cost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

export function hashPassword(password: string): Promise<string> {
  return hash(password, cost);
}

export function passwordMatches(stored: string, password: string): Promise<boolean> {
  return verify(stored, password, cost);
}

let decoy: Promise<string> | null = null;

/** Takes as long as a real comparison, so that the time tells nobody whether an address exists. */
export async function compareWithNobody(password: string): Promise<void> {
  decoy ??= hashPassword('nobody has this password');
  await passwordMatches(await decoy, password);
}

/** Long passwords that stand on every list of guessed ones, without case, spaces and signs. */
const common = new Set([
  'passwordpassword',
  'password1234',
  'password12345',
  'password123456',
  '123456789012',
  '1234567890123',
  '1234567890123456',
  'qwertyuiopas',
  'qwertyuiop12',
  'qwertyuiop123',
  'iloveyou1234',
  'adminadminadmin',
  'administrator',
  'letmeinletmein',
  'welcome12345',
  'changemechangeme',
  'correcthorsebatterystaple',
]);

/** A password that is guessed first: on the list, or one character or one pair over and over. */
export function isCommon(password: string): boolean {
  const plain = password.toLowerCase().replace(/[^a-z0-9]/g, '');
  return common.has(plain) || new Set(password).size < 4;
}
