import { copyFileSync, existsSync, mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import Database from 'better-sqlite3';
import { drizzle, type BetterSQLite3Database } from 'drizzle-orm/better-sqlite3';
import { migrate } from 'drizzle-orm/better-sqlite3/migrator';
import * as schema from './schema';

export type Db = BetterSQLite3Database<typeof schema>;

export interface OpenDatabase {
  db: Db;
  /** throws where the database does not answer */
  ping: () => void;
  close: () => void;
}

const migrationsFolder = fileURLToPath(new URL('../../drizzle', import.meta.url));

/**
 * Opens the database file (`:memory:` for one that ends with the process) and brings it up to date.
 *
 * Foreign keys are off while migrating: a rebuilt table is dropped under its old name first, which would take
 * the rows that point to it along. They are checked before they are turned on again, and a file that is about
 * to change is copied beside itself first.
 */
export function openDatabase(file: string): OpenDatabase {
  const inMemory = file === ':memory:';
  if (!inMemory) mkdirSync(dirname(file), { recursive: true });
  const existed = !inMemory && existsSync(file);
  const sqlite = new Database(file);
  sqlite.pragma('journal_mode = WAL');
  sqlite.pragma('synchronous = FULL');
  sqlite.pragma('busy_timeout = 5000');
  sqlite.pragma('foreign_keys = OFF');
  const db = drizzle(sqlite, { schema });
  const applied = migrationsApplied(sqlite);
  if (existed && applied !== null) {
    sqlite.pragma('wal_checkpoint(TRUNCATE)');
    copyFileSync(file, `${file}.before-migration`);
  }
  migrate(db, { migrationsFolder });
  const broken = sqlite.pragma('foreign_key_check');
  if (Array.isArray(broken) && broken.length > 0) {
    sqlite.close();
    throw new Error(
      `The database ${file} has ${broken.length} rows that point to nothing; restore a backup.`,
    );
  }
  sqlite.pragma('foreign_keys = ON');
  return {
    db,
    ping: () => {
      sqlite.prepare('select 1').get();
    },
    close: () => {
      sqlite.close();
    },
  };
}

/** How many migrations a database has had; null where it is new. */
function migrationsApplied(sqlite: Database.Database): number | null {
  const table = sqlite.prepare("select name from sqlite_master where name = '__drizzle_migrations'").get();
  if (table === undefined) return null;
  const row = sqlite.prepare('select count(*) as n from __drizzle_migrations').get();
  return typeof row === 'object' && row !== null && 'n' in row ? Number(row.n) : null;
}
