/** Where something stands in a production file: field names and list positions, which count from 0. */
export type Path = readonly (string | number)[];

/** Written as in every fault: `passes[3].minutes`, `rooms[0].open[1].to`; the file as a whole is `file`. */
export function writePath(path: Path): string {
  if (path.length === 0) return 'file';
  let written = '';
  for (const step of path) {
    if (typeof step === 'number') written += `[${step}]`;
    else written += written === '' ? plainKey(step) : `.${plainKey(step)}`;
  }
  return written;
}

/** A field name of a strange file is shown in quotes and cut short, so that a fault stays one line. */
function plainKey(key: string): string {
  if (/^[\p{L}\p{N}_-]{1,64}$/u.test(key)) return key;
  return JSON.stringify(key.length > 64 ? `${key.slice(0, 63)}…` : key);
}

export type Fields = Record<string, unknown>;
export const isFields = (value: unknown): value is Fields => typeof value === 'object' && value !== null && !Array.isArray(value);
export const fieldOf = (value: unknown, key: string): unknown => (isFields(value) && Object.hasOwn(value, key) ? value[key] : undefined);
export const itemsOf = (value: unknown): unknown[] => (Array.isArray(value) ? value : []);

/** Sets a field as the object's own, also where it is called `__proto__`. */
export function setOwn(target: object, key: string | number, value: unknown): void {
  Object.defineProperty(target, key, { value, enumerable: true, writable: true, configurable: true });
}

export interface Found {
  path: Path;
  value: unknown;
}

/**
 * What stands at a pattern such as `open[].from`, `parts[].players[]` or `ready{}` (`[]` each item of a list, `{}` each key of a
 * mapping) below `value`. Whatever is missing or of another shape is passed over: its own fault is told elsewhere.
 */
export function valuesAt(value: unknown, pattern: string, path: Path = []): Found[] {
  let found: Found[] = [{ path, value }];
  for (const step of pattern.split('.')) {
    const key = step.replace(/(\[\]|\{\})$/, '');
    found = found.flatMap(({ path: at, value: within }): Found[] => {
      const next = key === '' ? within : fieldOf(within, key);
      const here = key === '' ? at : [...at, key];
      if (next === undefined) return [];
      if (step.endsWith('[]')) return itemsOf(next).map((item, index) => ({ path: [...here, index], value: item }));
      if (step.endsWith('{}')) return isFields(next) ? Object.keys(next).map((name) => ({ path: [...here, name], value: name })) : [];
      return [{ path: here, value: next }];
    });
  }
  return found;
}
