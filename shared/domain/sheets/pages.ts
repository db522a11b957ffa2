import type { Paper } from './sheet';

/**
 * Space on paper. The sheets are set in millimetres: 190 mm wide on both papers, a clip margin of 20 mm above, and as much below as a
 * printer needs for the page number. What does not fit goes to the next page, under the same header. The heights are those of
 * templates/print.css, taken a little too large; a page that is still too long is broken by the printer itself.
 */
export const PAGE_MM: Record<Paper, { width: number; height: number; live: number }> = {
  A4: { width: 210, height: 297, live: 259 },
  Letter: { width: 215.9, height: 279.4, live: 245 },
};

/** Mean width of a sign of the sheet's face at 12 pt, in millimetres, rounded up. */
const SIGN_MM = 2.25;

/** How many lines a text takes in a column. Wide signs (CJK, emoji) count double. */
export function linesOf(text: string, columnMm: number, points = 12): number {
  let width = 0;
  for (const sign of text) width += (sign.codePointAt(0)! >= 0x1100 ? 2 : 1) * SIGN_MM * (points / 12);
  return Math.max(1, Math.ceil(width / columnMm));
}

/**
 * Fills pages in order.
 * @param heightOf millimetres of one item.
 * @param room millimetres that a page has for items.
 * @param most items that count (see `counts`) on one page.
 */
export function fillPages<Item>(
  items: readonly Item[],
  heightOf: (item: Item) => number,
  room: number,
  most = Infinity,
  counts: (item: Item) => boolean = () => true,
): Item[][] {
  const pages: Item[][] = [[]];
  let used = 0;
  let counted = 0;
  for (const item of items) {
    const height = heightOf(item);
    const page = pages.at(-1)!;
    const full = used + height > room || (counts(item) && counted === most);
    if (full && page.length > 0) {
      pages.push([item]);
      used = height;
      counted = counts(item) ? 1 : 0;
    } else {
      page.push(item);
      used += height;
      counted += counts(item) ? 1 : 0;
    }
  }
  return pages;
}
