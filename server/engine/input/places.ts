import type { Connection, MemberDocument, Rules } from '@shared/schemas/member';
import type { Issue } from '@shared/schemas/refusal';
import { touching } from '../beam/events';

/** The member's rules with a connection's own put over them. */
export function rulesOf(document: MemberDocument, connection: Connection): Rules {
  const rules = { ...document.rules };
  const own = connection.rules;
  if (!own) return rules;
  return {
    ...rules,
    spacingStep: own.spacingStep ?? rules.spacingStep,
    spacingMin: own.spacingMin ?? rules.spacingMin,
    spacingMax: own.spacingMax ?? rules.spacingMax,
    maxZones: own.maxZones ?? rules.maxZones,
    zoneGrid: own.zoneGrid ?? rules.zoneGrid,
    minZoneLength: own.minZoneLength ?? rules.minZoneLength,
    mirror: own.mirror ?? rules.mirror,
  };
}

/** What stands where it cannot: off the beam, twice in one place, the wrong way round; and rules at odds. */
export function placeIssues(document: MemberDocument): Issue[] {
  return [
    ...supportIssues(document),
    ...loadIssues(document),
    ...ruleIssues(document),
    ...document.connections.flatMap((connection, i) => connectionIssues(document, connection, i)),
  ];
}

function offBeam(x: number, length: number): string | null {
  if (x >= 0 && x <= length) return null;
  return `lies off the beam: it must be between 0 and ${length} mm`;
}

function supportIssues(document: MemberDocument): Issue[] {
  const issues: Issue[] = [];
  const { length, supports, hinges } = document;
  supports.forEach((support, i) => {
    const off = offBeam(support.x, length);
    if (off) issues.push({ path: `supports.${i}.x`, message: `Support ${support.id} ${off}.` });
    const twin = supports.slice(0, i).find((s) => Math.abs(s.x - support.x) <= touching);
    if (twin) {
      issues.push({
        path: `supports.${i}.x`,
        message: `Supports ${twin.id} and ${support.id} stand at one place: keep one of them.`,
      });
    }
    if (support.kind === 'spring' && support.stiffness === undefined) {
      issues.push({
        path: `supports.${i}.stiffness`,
        message: `Support ${support.id} is a spring: give its stiffness in N/mm.`,
      });
    }
  });
  hinges.forEach((x, i) => {
    if (!(x > 0 && x < length)) {
      issues.push({
        path: `hinges.${i}`,
        message: `A hinge lies inside the beam, between 0 and ${length} mm: at an end the moment is nothing anyway.`,
      });
    }
    if (hinges.slice(0, i).some((other) => Math.abs(other - x) <= touching)) {
      issues.push({ path: `hinges.${i}`, message: 'Two hinges stand at one place: keep one of them.' });
    }
    const clamp = supports.find((s) => s.kind === 'fixed' && Math.abs(s.x - x) <= touching);
    if (clamp) {
      issues.push({
        path: `hinges.${i}`,
        message: `A hinge at the fixed support ${clamp.id} is not clear: make the support a pin, or move the hinge beside it.`,
      });
    }
  });
  return issues;
}

function loadIssues(document: MemberDocument): Issue[] {
  const issues: Issue[] = [];
  const { length, materials, pieces } = document;
  document.loadCases.forEach((loadCase, c) => {
    if (loadCase.selfWeight) {
      materials.forEach((material, i) => {
        if (material.density === undefined && pieces.some((p) => p.material === material.id)) {
          issues.push({
            path: `materials.${i}.density`,
            message: `Load case ${loadCase.id} asks for self-weight: give the density of ${material.name || material.id} in kg/m³.`,
          });
        }
      });
    }
    loadCase.loads.forEach((load, i) => {
      const path = `loadCases.${c}.loads.${i}`;
      if (load.kind === 'point' || load.kind === 'couple') {
        const off = offBeam(load.x, length);
        if (off) issues.push({ path: `${path}.x`, message: `The load ${off}.` });
        return;
      }
      if (load.kind === 'moving') {
        if (load.to < load.from) {
          issues.push({
            path: `${path}.to`,
            message: 'The travel ends before it begins: “to” must not be below “from”.',
          });
        }
        return;
      }
      for (const end of ['from', 'to'] as const) {
        const off = offBeam(load[end], length);
        if (off)
          issues.push({
            path: `${path}.${end}`,
            message: `The load’s ${end === 'from' ? 'start' : 'end'} ${off}.`,
          });
      }
      if (load.to - load.from <= touching) {
        issues.push({
          path: `${path}.to`,
          message: 'The load ends where it begins, or before: “to” must be more than “from”.',
        });
      }
    });
  });
  return issues;
}

function ruleIssues(document: MemberDocument): Issue[] {
  if (document.rules.spacingMin <= document.rules.spacingMax) return [];
  return [
    {
      path: 'rules.spacingMin',
      message: `The smallest spacing (${document.rules.spacingMin}) is over the largest (${document.rules.spacingMax}).`,
    },
  ];
}

function connectionIssues(document: MemberDocument, connection: Connection, i: number): Issue[] {
  const issues: Issue[] = [];
  const rules = rulesOf(document, connection);
  const ownMin = connection.rules?.spacingMin !== undefined;
  if ((ownMin || connection.rules?.spacingMax !== undefined) && rules.spacingMin > rules.spacingMax) {
    issues.push({
      path: `connections.${i}.rules.${ownMin ? 'spacingMin' : 'spacingMax'}`,
      message: `The smallest spacing (${rules.spacingMin}) is over the largest (${rules.spacingMax}).`,
    });
  }
  if (connection.kind === 'adhesive' && connection.capacity.basis === 'test') {
    issues.push({
      path: `connections.${i}.capacity.basis`,
      message: 'The capacity of an adhesive is given as ultimate or allowable, in MPa.',
    });
  }
  if (connection.zones)
    issues.push(...zoneIssues(connection.zones, document.length, `connections.${i}.zones`));
  return issues;
}

function zoneIssues(zones: readonly { from: number; to: number }[], length: number, path: string): Issue[] {
  const issues: Issue[] = [];
  const order = zones.map((zone, i) => ({ ...zone, i })).sort((a, b) => a.from - b.from || a.to - b.to);
  let reached = 0;
  for (const { from, to, i } of order) {
    if (!(to - from > touching)) {
      issues.push({ path: `${path}.${i}.to`, message: 'A zone must end after it begins.' });
    } else if (from - reached > touching) {
      issues.push({
        path: `${path}.${i}.from`,
        message: `No zone covers the beam from ${reached} to ${from} mm.`,
      });
    } else if (reached - from > touching) {
      issues.push({ path: `${path}.${i}.from`, message: `Zones overlap from ${from} to ${reached} mm.` });
    }
    reached = Math.max(reached, to);
  }
  const last = order[order.length - 1];
  if (last && length - reached > touching) {
    issues.push({
      path: `${path}.${last.i}.to`,
      message: `No zone covers the beam from ${reached} to ${length} mm.`,
    });
  } else if (last && reached - length > touching) {
    issues.push({
      path: `${path}.${last.i}.to`,
      message: `The zones end at ${reached}, past the beam’s end at ${length} mm.`,
    });
  }
  return issues;
}
