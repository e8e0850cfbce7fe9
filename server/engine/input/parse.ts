import { documentLimits, memberDocumentSchema, type MemberDocument } from '@shared/schemas/member';
import type { Issue } from '@shared/schemas/refusal';
import type { Notice } from '@shared/schemas/result';
import { touching } from '../beam/events';
import { Refused } from '../refused';
import { idIssues, referenceIssues } from './references';
import { placeIssues } from './places';

/** A document that can be calculated, and what it holds that the calculation does not use. */
export interface Parsed {
  document: MemberDocument;
  notices: Notice[];
}

/**
 * Turns a JSON value into a member document with its defaults filled in.
 * Throws `Refused` with an issue for each field that is wrong.
 */
export function parseMember(input: unknown): Parsed {
  const parsed = memberDocumentSchema.safeParse(input);
  if (!parsed.success) {
    const issues = parsed.error.issues.map((issue): Issue => ({
      path: issue.path.map(String).join('.'),
      message: sentence(issue.message),
    }));
    throw refusal('invalid-document', issues);
  }
  const document = snapPlaces(parsed.data);
  const limits = limitIssues(document);
  if (limits.length > 0) throw refusal('invalid-document', limits);
  const ids = idIssues(document);
  if (ids.length > 0) throw refusal('invalid-document', ids);
  const references = referenceIssues(document);
  if (references.length > 0) throw refusal('unknown-reference', references);
  const places = placeIssues(document);
  if (places.length > 0) throw refusal('invalid-document', places);
  const later = document.connections.flatMap((connection, i): Issue[] => {
    const { basis } = connection.capacity;
    if (basis !== 'nds' && basis !== 'ec5') return [];
    const standard = basis === 'nds' ? 'the NDS yield limit equations' : 'the yield model of EN 1995-1-1';
    return [
      {
        path: `connections.${i}.capacity.basis`,
        message: `This version does not work out a capacity by ${standard} yet: give the fastener’s value as ultimate, allowable or test.`,
      },
    ];
  });
  if (later.length > 0) throw refusal('not-available', later);
  return { document, notices: unusedFields(input, parsed.data, '') };
}

function refusal(code: 'invalid-document' | 'unknown-reference' | 'not-available', issues: Issue[]): Refused {
  const [first] = issues;
  const more = issues.length > 1 ? ` (and ${issues.length - 1} more)` : '';
  return new Refused(code, `${first?.message ?? 'The document cannot be read.'}${more}`, issues);
}

function sentence(message: string): string {
  return message.endsWith('.') ? message : `${message}.`;
}

function limitIssues(document: MemberDocument): Issue[] {
  const issues: Issue[] = [];
  const loads = document.loadCases.reduce((sum, c) => sum + c.loads.length, 0);
  if (loads > documentLimits.loads) {
    issues.push({
      path: 'loadCases',
      message: `The member has ${loads} loads: at most ${documentLimits.loads} are allowed.`,
    });
  }
  const cells = document.length / document.rules.zoneGrid;
  if (cells > documentLimits.zoneCells) {
    issues.push({ path: 'rules.zoneGrid', message: gridMessage(document.length) });
  }
  document.connections.forEach((connection, i) => {
    const grid = connection.rules?.zoneGrid;
    if (grid !== undefined && document.length / grid > documentLimits.zoneCells) {
      issues.push({ path: `connections.${i}.rules.zoneGrid`, message: gridMessage(document.length) });
    }
  });
  return issues;
}

function gridMessage(length: number): string {
  const least = Math.ceil(length / documentLimits.zoneCells);
  return `The zone grid may cut the beam into ${documentLimits.zoneCells} steps at most: make it ${least} mm or more.`;
}

/**
 * Places along the beam that are within touching distance of each other become one, so that a hinge typed a
 * hair beside a support is at that support.
 */
function snapPlaces(document: MemberDocument): MemberDocument {
  const { length } = document;
  const known = [0, length];
  const snap = (x: number): number => {
    for (const place of known) if (Math.abs(place - x) <= touching) return place;
    return x;
  };
  const supports = document.supports.map((s) => ({ ...s, x: snap(s.x) }));
  known.push(...supports.map((s) => s.x));
  const hinges = document.hinges.map(snap);
  known.push(...hinges);
  const loadCases = document.loadCases.map((c) => ({
    ...c,
    loads: c.loads.map((load) => {
      switch (load.kind) {
        case 'uniform':
        case 'varying':
        case 'moving':
          return { ...load, from: snap(load.from), to: snap(load.to) };
        case 'point':
        case 'couple':
          return { ...load, x: snap(load.x) };
      }
    }),
  }));
  return { ...document, supports, hinges, loadCases };
}

/** Says which fields the schema does not know: a mistyped name must not pass unseen. */
function unusedFields(raw: unknown, parsed: unknown, path: string): Notice[] {
  const notices: Notice[] = [];
  const visit = (given: unknown, kept: unknown, at: string): void => {
    if (notices.length >= 20 || typeof given !== 'object' || given === null) return;
    if (typeof kept !== 'object' || kept === null) return;
    const keptEntries = new Map(Object.entries(kept));
    for (const [key, value] of Object.entries(given)) {
      const inner = at === '' ? key : `${at}.${key}`;
      if (keptEntries.has(key)) visit(value, keptEntries.get(key), inner);
      else if (value !== undefined && notices.length < 20) {
        notices.push({
          code: 'unknown-field',
          message: `${inner.slice(0, 200)} is not a field of the member document, so it was not used.`,
        });
      }
    }
  };
  visit(raw, parsed, path);
  return notices;
}
