/**
 * Widths of text without a browser, so that one pure layout serves screen, preview and print. Advance widths are those of Atkinson
 * Hyperlegible 400 and 700 in hundredths of an em for the signs from space to tilde (measured in Chromium from the bundled font files).
 */
const REGULAR = [
  28, 28, 30, 65, 59, 93, 70, 16, 30, 30, 43, 60, 20, 37, 20, 38, 65, 40, 55, 57, 61, 58, 60, 51, 61, 60, 20, 20, 55, 60, 55, 52, 78, 63,
  62, 66, 67, 57, 55, 71, 69, 41, 51, 63, 54, 82, 69, 73, 60, 75, 62, 60, 56, 69, 59, 84, 62, 59, 61, 31, 38, 31, 55, 40, 27, 53, 57, 50,
  56, 54, 31, 56, 55, 28, 25, 49, 24, 84, 55, 55, 57, 58, 34, 47, 32, 54, 44, 65, 46, 43, 46, 32, 23, 32, 55,
];
const BOLD = [
  32, 28, 41, 78, 62, 98, 70, 22, 37, 37, 43, 62, 24, 37, 24, 44, 65, 45, 59, 60, 63, 61, 63, 54, 62, 56, 24, 24, 57, 62, 57, 61, 75, 69,
  64, 67, 69, 58, 54, 72, 68, 46, 56, 66, 54, 84, 70, 76, 63, 78, 65, 62, 62, 66, 66, 88, 70, 69, 62, 33, 44, 33, 59, 43, 31, 55, 60, 52,
  60, 57, 37, 60, 57, 31, 26, 57, 31, 89, 57, 57, 60, 60, 37, 53, 38, 57, 53, 72, 53, 52, 52, 37, 23, 37, 53,
];
/** Tabular figures are as wide as the widest one. */
const FIGURE = 65;
const ELLIPSIS = '…';

function signWidth(sign: string, bold: boolean): number {
  const point = sign.codePointAt(0)!;
  if (point >= 0x30 && point <= 0x39) return FIGURE;
  if (point >= 0x20 && point < 0x7f) return (bold ? BOLD : REGULAR)[point - 0x20]!;
  // Combining marks and joiners take no room of their own.
  if ((point >= 0x300 && point < 0x370) || point === 0x200d || (point >= 0xfe00 && point < 0xfe10)) return 0;
  // East Asian scripts and pictographs fill the em; pictographs of many fonts are wider still.
  if (point >= 0x1f000) return 130;
  if (point >= 0x1100 && (point < 0x11ff || point >= 0x2e80)) return 100;
  if (point === 0x2014 || point === 0x2026) return 84;
  if (point === 0x2192) return 100;
  return bold ? 70 : 65;
}

/** Width in px of a text set in one line at a size in px. */
export function textWidth(text: string, size: number, bold = false): number {
  let hundredths = 0;
  for (const sign of text) hundredths += signWidth(sign, bold);
  return (hundredths * size) / 100;
}

/** The text, or as much of its beginning as fits the width, closed by an ellipsis; empty where not even one sign fits. */
export function fitText(text: string, width: number, size: number, bold = false): string {
  if (textWidth(text, size, bold) <= width) return text;
  const signs = [...text];
  for (let kept = signs.length - 1; kept > 0; kept--) {
    const short = signs.slice(0, kept).join('').trimEnd() + ELLIPSIS;
    if (textWidth(short, size, bold) <= width) return short;
  }
  return '';
}

/**
 * Breaks a text at spaces into at most `most` lines; the first may be shorter by `indent` px. What does not fit is closed by an ellipsis.
 */
export function wrapText(text: string, width: number, size: number, most: number, indent = 0): string[] {
  const lines: string[] = [];
  let words = text.split(/\s+/).filter((word) => word !== '');
  while (words.length > 0 && lines.length < most) {
    const room = width - (lines.length === 0 ? indent : 0);
    let count = 0;
    while (count < words.length && textWidth(words.slice(0, count + 1).join(' '), size) <= room) count++;
    if (lines.length === most - 1 || count === 0) {
      const last = lines.length === most - 1 ? words.join(' ') : words[0]!;
      lines.push(fitText(last, room, size));
      words = words.slice(lines.length === most ? words.length : 1);
    } else {
      lines.push(words.slice(0, count).join(' '));
      words = words.slice(count);
    }
  }
  return lines.filter((line) => line !== '');
}
