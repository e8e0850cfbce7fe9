import { valueAt } from './draft-document';
import type { DraftDocument } from './draft-document';

const names: Record<string, string> = {
  connections: 'connection',
  capacity: 'capacity',
  value: 'value',
  values: 'test values',
  basis: 'basis',
  factorOfSafety: 'factor of safety',
  rows: 'rows',
  kind: 'kind',
  slipModulus: 'slip modulus',
  bead: 'bead',
  fastener: 'fastener',
  diameter: 'diameter',
  length: 'length',
  headDiameter: 'head diameter',
  headSide: 'head side',
  predrilled: 'predrilled',
  type: 'type',
  shank: 'shank',
  rules: 'rules',
  spacingStep: 'spacing step',
  spacingMin: 'smallest spacing',
  spacingMax: 'largest spacing',
  maxZones: 'most zones',
  zoneGrid: 'zone grid',
  minZoneLength: 'shortest zone',
  mirror: 'mirror',
  zones: 'pinned zones',
  pieces: 'pieces',
  supports: 'supports',
  hinges: 'hinges',
  materials: 'woods',
  loadCases: 'load cases',
  loads: 'loads',
  combinations: 'combinations',
  title: 'title',
  deflectionLimit: 'deflection limit',
};

/** What stands at a place of a list: its id, the pieces it joins, or its number. */
const itemName = (document: DraftDocument, path: string, index: number): string => {
  const id = valueAt(document, `${path}.id`);
  if (typeof id === 'string' && id !== '') return id;
  const [a, b] = [valueAt(document, `${path}.pieces.0`), valueAt(document, `${path}.pieces.1`)];
  return typeof a === 'string' && typeof b === 'string' ? `${a}–${b}` : String(index + 1);
};

/** A dotted path in words that stand on the screen: "connection lower–upper · capacity · value". */
export function wordsForPath(document: DraftDocument, path: string): string {
  if (path === '') return 'the document';
  const parts: string[] = [];
  let walked = '';
  for (const key of path.split('.')) {
    walked = walked === '' ? key : `${walked}.${key}`;
    const last = parts.length - 1;
    if (/^\d+$/.test(key) && last >= 0)
      parts[last] = `${parts[last] ?? ''} ${itemName(document, walked, Number(key))}`;
    else parts.push(names[key] ?? key);
  }
  return parts.join(' · ');
}

/** A value of a document in a few words, for telling two apart. */
export function wordsForValue(value: unknown): string {
  if (value === undefined || value === null) return 'nothing';
  if (typeof value === 'number' || typeof value === 'boolean') return String(value);
  if (typeof value === 'string') return `“${value}”`;
  if (Array.isArray(value)) return value.length === 1 ? 'a list of 1' : `a list of ${value.length}`;
  return 'an entry';
}
