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

/** Mean width of a sign of the sheet's face at 12 pt, in millimetres, rounded up; bold ones are wider. */
const SIGN_MM = { regular: 2.2, bold: 2.4 };

function widthOf(word: string, sign: number): number {
  let width = 0;
  // Wide signs (CJK, emoji) take two places.
  for (const one of word) width += (one.codePointAt(0)! >= 0x1100 ? 2 : 1) * sign;
  return width;
}

/** How many lines a text takes in a column, word by word; a word that is longer than the column is broken. */
export function linesOf(text: string, columnMm: number, { points = 12, bold = false } = {}): number {
  const sign = (bold ? SIGN_MM.bold : SIGN_MM.regular) * (points / 12);
  let lines = 1;
  let used = 0;
  for (const word of text.split(/\s+/)) {
    const width = widthOf(word, sign);
    if (used > 0 && used + sign + width > columnMm) {
      lines++;
      used = 0;
    }
    lines += Math.max(0, Math.ceil(width / columnMm) - 1);
    used += (used > 0 ? sign : 0) + (width > columnMm ? width % columnMm : width);
  }
  return lines;
}

/** Millimetres that the top of a page takes more where the title of the production or another text of the header needs more lines. */
export function headerExtra(title: string, others: readonly { text: string; column: number; points?: number; bold?: boolean }[]): number {
  return [{ text: title, column: 130 }, ...others].reduce((sum, { text, column, points = 12, bold = false }) => {
    return sum + (linesOf(text, column, { points, bold }) - 1) * points * 0.45;
  }, 0);
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
