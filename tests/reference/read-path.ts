/**
 * Reads one figure of a result by a path: names, `[n]`, `[key=value]` (several keys by commas; an array's values
 * match joined by commas), and `envelope.FIELD@x` for the station at x: of the two stations at a jump the larger
 * value, for a field that ends in `Min` the smaller. Throws, naming the step, where the path leads nowhere.
 */
export function readPath(result: unknown, path: string): unknown {
  const at = path.indexOf('@');
  if (at >= 0) return readStation(result, path.slice(0, at), Number(path.slice(at + 1)));
  return steps(path).reduce((value, step) => take(value, step, path), result);
}

function steps(path: string): string[] {
  return path.match(/\[[^\]]*\]|[^.[\]]+/g) ?? [];
}

function take(value: unknown, step: string, path: string): unknown {
  if (!step.startsWith('[')) return property(value, step, path);
  const inside = step.slice(1, -1);
  if (!Array.isArray(value)) throw new Error(`${path}: ${step} reads into something that is no list`);
  const items: unknown[] = value;
  if (/^\d+$/.test(inside)) {
    if (Number(inside) >= items.length) throw new Error(`${path}: no entry ${step}`);
    return items[Number(inside)];
  }
  const wanted = inside.split(/,(?=\w+=)/).map((pair) => {
    const cut = pair.indexOf('=');
    return { key: pair.slice(0, cut), text: pair.slice(cut + 1) };
  });
  const found = items.find((item) =>
    wanted.every(({ key, text }) => String(property(item, key, path)) === text),
  );
  if (found === undefined) throw new Error(`${path}: no entry ${step}`);
  return found;
}

function property(value: unknown, name: string, path: string): unknown {
  if (typeof value !== 'object' || value === null || !(name in value)) throw new Error(`${path}: no ${name}`);
  const entries: [string, unknown][] = Object.entries(value);
  return entries.find(([key]) => key === name)?.[1];
}

function readStation(result: unknown, path: string, x: number): number {
  const stations = numbers(readPath(result, 'envelope.x'), 'envelope.x');
  const values = numbers(readPath(result, path), path);
  const here = values.filter((_, i) => Math.abs((stations[i] ?? NaN) - x) < 1e-6);
  if (here.length === 0) throw new Error(`${path}: no station at ${x}`);
  return path.endsWith('Min') ? Math.min(...here) : Math.max(...here);
}

function numbers(value: unknown, path: string): number[] {
  if (!Array.isArray(value)) throw new Error(`${path} is no list`);
  return value.map((item: unknown) => {
    if (typeof item !== 'number') throw new Error(`${path} holds something that is no number`);
    return item;
  });
}
