import { z } from 'zod';

const flag = z.enum(['true', 'false']).transform((v) => v === 'true');

const schema = z.object({
  PORT: z.coerce.number({ error: 'a port between 0 and 65535' }).int().min(0).max(65_535).default(3000),
  HOST: z.string().min(1).default('127.0.0.1'),
  DATABASE_FILE: z.string().min(1).default('data/seamwright.db'),
  PUBLIC_URL: z
    .url({ protocol: /^https?$/, error: 'an address such as https://beams.office.example' })
    .optional(),
  TRUST_PROXY: z
    .union([flag, z.coerce.number().int().min(0).max(10)], {
      error: 'true, false, or how many proxies stand in front',
    })
    .default(false),
  LOG_LEVEL: z
    .enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent'], {
      error: 'one of fatal, error, warn, info, debug, trace, silent',
    })
    .default('info'),
});
export type Environment = z.output<typeof schema>;

/** Reads the environment; throws with a sentence for every value that is wrong. */
export function readEnvironment(values: Record<string, string | undefined>): Environment {
  const given = Object.fromEntries(
    Object.entries(values).filter(([, value]) => value !== undefined && value !== ''),
  );
  const parsed = schema.safeParse(given);
  if (parsed.success) return parsed.data;
  const sentences = parsed.error.issues.map((issue) => {
    const name = String(issue.path[0] ?? '');
    return `${name} is “${given[name] ?? ''}”, and should be ${issue.message}.`;
  });
  throw new Error(sentences.join('\n'));
}
