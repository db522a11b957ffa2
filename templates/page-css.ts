import { type Paper, sheetFoot, type SheetHead } from '../shared/domain/sheets/sheet';

/** A string for the style sheet: every sign that could mean something there is written as its number. */
function cssString(text: string): string {
  return `"${text.replace(/[^\p{L}\p{N} .,·–-]/gu, (sign) => `\\${sign.codePointAt(0)!.toString(16)} `)}"`;
}

/** A clip margin of 20 mm above; 190 mm wide on both papers; the page number stands in the margin below. */
const MARGINS: Record<Paper, string> = { A4: '20mm 10mm 18mm', Letter: '20mm 12.95mm 14.4mm' };

/** Size, margins and the counted foot of a printed document. The counters are the printer's own, so they are right even where a page runs over. */
export function pageCss(head: SheetHead): string {
  const { paper } = head;
  const box = 'font: 12pt "Atkinson Hyperlegible", "Liberation Sans", sans-serif; vertical-align: top; padding-top: 3mm;';
  return `@page { size: ${paper === 'A4' ? 'A4' : 'letter'}; margin: ${MARGINS[paper]};
  @bottom-left { ${box} content: ${cssString(sheetFoot(head))}; }
  @bottom-right { ${box} content: "Page " counter(page) " of " counter(pages); } }
html, body { margin: 0; }
`;
}
