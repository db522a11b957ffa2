/** Longest id a production file allows. */
const LONGEST = 64;

/**
 * An id made from a name, free among those taken: `Half a Ferry` → `half-a-ferry`, then `half-a-ferry-2`. A name without any Latin
 * letter or digit gives `fallback`.
 */
export function freeId(name: string, taken: Iterable<string>, fallback: string): string {
  const plain = name
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, LONGEST - 4)
    .replace(/-+$/, '');
  const base = plain || fallback;
  const used = new Set(taken);
  if (!used.has(base)) return base;
  let number = 2;
  while (used.has(`${base}-${number}`)) number += 1;
  return `${base}-${number}`;
}

/** The next code in the manner of those there are: `S07` → `S08`; without any, `S01`. */
export function nextCode(codes: string[]): string {
  const numbered = codes.flatMap((code) => {
    const match = /^(\D*)(\d+)$/.exec(code);
    return match ? [{ letters: match[1] ?? '', digits: match[2] ?? '' }] : [];
  });
  const last = numbered.reduce<{ letters: string; digits: string } | undefined>(
    (most, code) => (!most || Number(code.digits) > Number(most.digits) ? code : most),
    undefined,
  );
  if (!last) return 'S01';
  return last.letters + String(Number(last.digits) + 1).padStart(last.digits.length, '0');
}
