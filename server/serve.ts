import { createServer, type Server } from 'node:http';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import pino, { type Logger } from 'pino';
import { createApp } from './app';
import type { OpenDatabase } from './db/open';
import { calculateMember } from './engine/calculate-member';
import { engineVersion } from './engine/version';
import type { Environment } from './http/environment';

export interface Serving {
  address: string;
  stop: () => Promise<void>;
}

/** The version in package.json. */
export function applicationVersion(): string {
  const text = readFileSync(new URL('../package.json', import.meta.url), 'utf8');
  const parsed: unknown = JSON.parse(text);
  return typeof parsed === 'object' && parsed !== null && 'version' in parsed ? String(parsed.version) : '0';
}

/** Listens with the real engine and clock; the database comes opened. */
export async function serve(
  environment: Environment,
  database: OpenDatabase,
  log: Logger = pino({ level: environment.LOG_LEVEL }),
): Promise<Serving> {
  const app = createApp({
    database,
    calculate: calculateMember,
    engineVersion,
    clock: () => Date.now(),
    log,
    settings: {
      version: applicationVersion(),
      publicUrl: environment.PUBLIC_URL ?? null,
      trustProxy: environment.TRUST_PROXY,
      signInsPerMinute: 30,
      requestsPerMinute: 3000,
      staticFolder: fileURLToPath(new URL('../dist', import.meta.url)),
    },
  });
  const server = createServer(app);
  await listen(server, environment.PORT, environment.HOST);
  const found = server.address();
  const port = typeof found === 'object' && found !== null ? found.port : environment.PORT;
  return {
    address: environment.PUBLIC_URL ?? `http://${environment.HOST}:${port}`,
    stop: () => stop(server, database),
  };
}

function listen(server: Server, port: number, host: string): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) => {
      if (error.code === 'EADDRINUSE')
        reject(new Error(`Port ${port} is taken: set PORT to another, or stop what listens there.`));
      else if (error.code === 'EACCES')
        reject(new Error(`Port ${port} may not be used by this account: set PORT to one over 1024.`));
      else reject(error);
    });
    server.listen(port, host, resolve);
  });
}

/** Lets running requests end, for five seconds at most, then closes the database. */
async function stop(server: Server, database: OpenDatabase): Promise<void> {
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  const late = setTimeout(() => server.closeAllConnections(), 5000);
  server.closeIdleConnections();
  await closed;
  clearTimeout(late);
  database.close();
}

/** Stops once on the signals that ask for it. */
export function stopOnSignals(serving: Serving): void {
  let stopping = false;
  for (const signal of ['SIGINT', 'SIGTERM'] as const) {
    process.on(signal, () => {
      if (stopping) return;
      stopping = true;
      void serving.stop().then(() => process.exit(0));
    });
  }
}
