import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const css = readFileSync('src/assets/theme.css', 'utf8');

/** Relative luminance of a colour `#rrggbb`, as WCAG 2.2 defines it. */
function luminance(colour: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5]
    .map((at) => Number.parseInt(colour.slice(at, at + 2), 16) / 255)
    .map((value) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4));
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}

function contrast(one: string, other: string): number {
  const [dark = 0, light = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

function tokensOf(theme: string): Record<string, string> {
  const block = css.split(`[data-theme='${theme}'] {`)[1]?.split('}')[0] ?? '';
  return Object.fromEntries([...block.matchAll(/--(\w+): (#[0-9a-f]{6});/g)].map((match) => [match[1], match[2]]));
}

describe.each(['paper', 'dim'])('the %s theme', (theme) => {
  const tokens = tokensOf(theme);
  const surfaces = ['paper', 'sheet', 'wash'];

  it.each(['ink', 'soft', 'focus', 'ok', 'look', 'rolling'])('sets %s so that it reads on every surface (4.5 : 1)', (name) => {
    for (const surface of surfaces)
      expect(contrast(tokens[name] ?? '', tokens[surface] ?? ''), `${name} on ${surface}`).toBeGreaterThanOrEqual(4.5);
  });

  it('sets the edge of a control off every surface (3 : 1)', () => {
    for (const surface of surfaces) expect(contrast(tokens.edge ?? '', tokens[surface] ?? '')).toBeGreaterThanOrEqual(3);
  });

  it('has no white in the dim room', () => {
    if (theme === 'dim') expect(luminance(tokens.ink ?? '')).toBeLessThan(0.8);
  });
});
