import type { MemberDocument } from '@shared/schemas/member';
import type { Issue } from '@shared/schemas/refusal';

/** Ids used twice. */
export function idIssues(document: MemberDocument): Issue[] {
  const issues: Issue[] = [];
  const unique = (list: readonly { id: string }[], path: string, what: string): void => {
    const seen = new Set<string>();
    list.forEach(({ id }, i) => {
      if (seen.has(id)) {
        issues.push({
          path: `${path}.${i}.id`,
          message: `Two ${what} have the id ${id}: give each its own.`,
        });
      }
      seen.add(id);
    });
  };
  unique(document.supports, 'supports', 'supports');
  unique(document.materials, 'materials', 'materials');
  unique(document.pieces, 'pieces', 'pieces');
  unique(document.loadCases, 'loadCases', 'load cases');
  unique(document.combinations, 'combinations', 'combinations');
  document.connections.forEach((connection, i) => {
    if (connection.pieces[0] === connection.pieces[1]) {
      issues.push({ path: `connections.${i}.pieces`, message: 'A connection joins two different pieces.' });
    }
  });
  return issues;
}

/** Names of things that are not there. */
export function referenceIssues(document: MemberDocument): Issue[] {
  const issues: Issue[] = [];
  const idsOf = (list: readonly { id: string }[]): Set<string> => new Set(list.map(({ id }) => id));
  const materials = idsOf(document.materials);
  const pieces = idsOf(document.pieces);
  const cases = idsOf(document.loadCases);

  document.pieces.forEach((piece, i) => {
    if (!materials.has(piece.material)) {
      issues.push({
        path: `pieces.${i}.material`,
        message: `No material has the id ${piece.material}: choose one of ${listed(materials)}.`,
      });
    }
  });
  document.connections.forEach((connection, i) => {
    connection.pieces.forEach((id, side) => {
      if (!pieces.has(id)) {
        issues.push({
          path: `connections.${i}.pieces.${side}`,
          message: `No piece has the id ${id}: choose one of ${listed(pieces)}.`,
        });
      }
    });
    const headSide = connection.fastener?.headSide;
    if (headSide !== undefined && !connection.pieces.includes(headSide)) {
      issues.push({
        path: `connections.${i}.fastener.headSide`,
        message: `The head is in one of the two pieces joined: ${connection.pieces.join(' or ')}.`,
      });
    }
  });
  document.loadCases.forEach((loadCase, i) => {
    loadCase.loads.forEach((load, j) => {
      if (load.on !== undefined && !pieces.has(load.on)) {
        issues.push({
          path: `loadCases.${i}.loads.${j}.on`,
          message: `No piece has the id ${load.on}: choose one of ${listed(pieces)}, or leave it out.`,
        });
      }
    });
  });
  document.combinations.forEach((combination, i) => {
    for (const id of Object.keys(combination.factors)) {
      if (!cases.has(id)) {
        issues.push({
          path: `combinations.${i}.factors.${id}`,
          message: `No load case has the id ${id}: choose one of ${listed(cases)}.`,
        });
      }
    }
  });
  return issues;
}

function listed(ids: ReadonlySet<string>): string {
  const all = [...ids];
  return all.length > 8 ? `${all.slice(0, 8).join(', ')} …` : all.join(', ');
}
