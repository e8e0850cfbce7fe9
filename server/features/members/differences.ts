/** The dotted paths at which two JSON values differ, as far down as both have the same shape; `most` at the most. */
export function differingPaths(a: unknown, b: unknown, most = 30): string[] {
  const found: string[] = [];
  const visit = (x: unknown, y: unknown, path: string): void => {
    if (found.length >= most || Object.is(x, y)) return;
    const bothObjects = isObject(x) && isObject(y) && Array.isArray(x) === Array.isArray(y);
    if (!bothObjects) {
      found.push(path);
      return;
    }
    const inY = new Map(Object.entries(y));
    const inX = new Map(Object.entries(x));
    for (const key of new Set([...inX.keys(), ...inY.keys()])) {
      visit(inX.get(key), inY.get(key), path === '' ? key : `${path}.${key}`);
    }
  };
  visit(a, b, '');
  return found;
}

function isObject(value: unknown): value is object {
  return typeof value === 'object' && value !== null;
}
