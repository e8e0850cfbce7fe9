import { integer, real, sqliteTable, text, uniqueIndex, index } from 'drizzle-orm/sqlite-core';

/** Tables. Times are milliseconds since 1970 UTC, but for `expires_at`, whose seconds the session library reads. */

export const people = sqliteTable(
  'people',
  {
    id: text('id').primaryKey(),
    /** in lower case: addresses are compared without regard to case */
    email: text('email').notNull(),
    name: text('name').notNull(),
    role: text('role', { enum: ['lead', 'staff'] }).notNull(),
    active: integer('active', { mode: 'boolean' }).notNull(),
    passwordHash: text('password_hash').notNull(),
    units: text('units', { enum: ['metric', 'us'] }).notNull(),
    theme: text('theme', { enum: ['system', 'light', 'dark'] }).notNull(),
    wrongTries: integer('wrong_tries').notNull().default(0),
    pausedUntil: integer('paused_until'),
    createdAt: integer('created_at').notNull(),
  },
  (table) => [uniqueIndex('people_email').on(table.email)],
);

export const sessions = sqliteTable(
  'sessions',
  {
    id: text('id').primaryKey(),
    userId: text('user_id')
      .notNull()
      .references(() => people.id, { onDelete: 'cascade' }),
    expiresAt: integer('expires_at').notNull(),
    startedAt: integer('started_at').notNull(),
    usedAt: integer('used_at').notNull(),
  },
  (table) => [index('sessions_user').on(table.userId)],
);

export const projects = sqliteTable(
  'projects',
  {
    id: text('id').primaryKey(),
    number: text('number').notNull(),
    name: text('name').notNull(),
    client: text('client').notNull(),
    siteAddress: text('site_address').notNull(),
    archived: integer('archived', { mode: 'boolean' }).notNull().default(false),
    designerId: text('designer_id').references(() => people.id),
    checkerId: text('checker_id').references(() => people.id),
    /** YYYY-MM-DD */
    due: text('due'),
    createdAt: integer('created_at').notNull(),
  },
  (table) => [uniqueIndex('projects_number').on(table.number)],
);

export const members = sqliteTable(
  'members',
  {
    id: text('id').primaryKey(),
    projectId: text('project_id')
      .notNull()
      .references(() => projects.id, { onDelete: 'cascade' }),
    mark: text('mark').notNull(),
    title: text('title').notNull(),
    state: text('state', { enum: ['draft', 'in-check', 'sent-back', 'signed-off', 'superseded'] }).notNull(),
    revision: text('revision').notNull(),
    /** the document as typed, JSON */
    document: text('document').notNull(),
    version: integer('version').notNull(),
    /** the result, JSON; null where refused */
    result: text('result'),
    /** the refusal, JSON; null where calculated */
    refusal: text('refusal'),
    /** the engine's version that gave either */
    engine: text('engine').notNull(),
    outcome: text('outcome', { enum: ['ok', 'over', 'advice', 'refused'] }).notNull(),
    utilisation: real('utilisation'),
    savedAt: integer('saved_at').notNull(),
    savedBy: text('saved_by').references(() => people.id),
  },
  (table) => [uniqueIndex('members_mark').on(table.projectId, table.mark)],
);
