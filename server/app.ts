import { existsSync } from 'node:fs';
import { join } from 'node:path';
import compression from 'compression';
import express, { type Express, type RequestHandler } from 'express';
import rateLimit from 'express-rate-limit';
import helmet from 'helmet';
import type { Logger } from 'pino';
import { pinoHttp } from 'pino-http';
import { documentLimits } from '@shared/schemas/member';
import type { OpenDatabase } from './db/open';
import type { Outcome } from './engine/calculate-member';
import { calculationRoutes } from './features/calculations/routes';
import { healthRoutes } from './features/health/routes';
import { memberRepo } from './features/members/repo';
import { memberRoutes } from './features/members/routes';
import { memberService } from './features/members/service';
import { projectRepo } from './features/projects/repo';
import { projectRoutes } from './features/projects/routes';
import { projectService } from './features/projects/service';
import { createSessions } from './features/session/lucia';
import { sessionRepo } from './features/session/repo';
import { identify, requirePerson, sessionRoutes } from './features/session/routes';
import { sessionService } from './features/session/service';
import { refuseCrossOrigin, requireJson } from './http/guards';
import { HttpProblem, notFound, problemHandler } from './http/problems';

export interface Settings {
  version: string;
  /** where the application is reached from outside; null where the address asked for is right */
  publicUrl: string | null;
  trustProxy: boolean | number;
  /** requests a minute and address; null for no limit */
  signInsPerMinute: number | null;
  requestsPerMinute: number | null;
  /** folder of the built client; null serves the interface alone */
  staticFolder: string | null;
}

export interface AppDeps {
  database: OpenDatabase;
  calculate: (document: unknown) => Outcome;
  engineVersion: string;
  clock: () => number;
  log: Logger;
  settings: Settings;
}

/** The whole HTTP application from what it needs; listens to nothing itself. */
export function createApp({ database, calculate, engineVersion, clock, log, settings }: AppDeps): Express {
  const { db } = database;
  const secure = settings.publicUrl?.startsWith('https:') ?? false;
  const sessions = sessionService({ repo: sessionRepo(db), sessions: createSessions(db), clock });
  const projects = projectService(projectRepo(db));
  const members = memberService({ repo: memberRepo(db), projects, calculate, engineVersion, clock });

  const app = express();
  app.set('trust proxy', settings.trustProxy);
  app.set('etag', false);
  app.disable('x-powered-by');
  app.use(pinoHttp({ logger: log, ...quietLog }));
  app.use(
    helmet({
      contentSecurityPolicy: {
        directives: {
          defaultSrc: ["'self'"],
          // React writes style attributes; scripts are ours alone
          styleSrc: ["'self'", "'unsafe-inline'"],
          imgSrc: ["'self'", 'data:'],
          frameAncestors: ["'none'"],
          upgradeInsecureRequests: secure ? [] : null,
        },
      },
      strictTransportSecurity: secure,
    }),
  );
  app.use(compression());

  const api = express.Router();
  api.use((_request, response, next) => {
    response.setHeader('Cache-Control', 'no-store');
    next();
  });
  api.use(healthRoutes(database.ping, settings.version, engineVersion));
  if (settings.requestsPerMinute !== null) api.use(limit(settings.requestsPerMinute));
  api.use(refuseCrossOrigin(settings.publicUrl));
  api.use(requireJson);
  api.use(express.json({ limit: documentLimits.bytes + 65_536 }));
  api.use(identify(sessions));
  api.use(
    sessionRoutes(
      sessions,
      secure,
      settings.signInsPerMinute === null ? pass : limit(settings.signInsPerMinute),
    ),
  );
  api.use(requirePerson);
  api.use(projectRoutes(projects));
  api.use(memberRoutes(members));
  api.use(calculationRoutes(calculate));
  api.use(notFound);
  app.use('/api', api);

  if (settings.staticFolder !== null) serveClient(app, settings.staticFolder);
  app.use(problemHandler(log));
  return app;
}

const pass: RequestHandler = (_request, _response, next) => {
  next();
};

function limit(perMinute: number): RequestHandler {
  return rateLimit({
    windowMs: 60_000,
    limit: perMinute,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    handler: () => {
      throw new HttpProblem('slow-down', 'Too many requests from this address. Wait a minute.', {
        retryAfter: 60,
      });
    },
  });
}

/** What a request leaves in the log: no cookies, no bodies, no passwords. */
const quietLog = {
  serializers: {
    req: ({ id, method, url }: { id: unknown; method: string; url: string }) => ({
      id,
      method,
      url: url.split('?')[0],
    }),
    res: ({ statusCode }: { statusCode: number }) => ({ statusCode }),
  },
};

/** The built client: hashed assets for good, everything else the one page. */
function serveClient(app: Express, folder: string): void {
  app.use('/assets', express.static(join(folder, 'assets'), { immutable: true, maxAge: '1y', index: false }));
  app.use(express.static(folder, { index: false, maxAge: '1h' }));
  app.get('/{*path}', (_request, response, next) => {
    const page = join(folder, 'index.html');
    if (!existsSync(page)) {
      next(new HttpProblem('not-found', 'The client is not built. Run npm run build.'));
      return;
    }
    response.setHeader('Cache-Control', 'no-cache');
    response.sendFile(page);
  });
}
