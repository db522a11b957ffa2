import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';

/** The text of a PDF as poppler reads it, lines as they stand on the page. */
export const textOfPdf = (pdf: Uint8Array): string => execFileSync('pdftotext', ['-layout', '-', '-'], { input: pdf, encoding: 'utf8' });

/** What one of poppler's tools says of a PDF. */
export function askOfPdf(tool: 'pdfinfo' | 'pdffonts', pdf: Uint8Array): string {
  const file = path.join(fs.mkdtempSync(path.join(os.tmpdir(), 'redpoll-pdf-test-')), 'sheet.pdf');
  fs.writeFileSync(file, pdf);
  try {
    return execFileSync(tool, [file], { encoding: 'utf8' });
  } finally {
    fs.rmSync(path.dirname(file), { recursive: true });
  }
}

/** One line of what `pdfinfo` says, by its name. */
export const factOfPdf = (info: string, name: string) => new RegExp(`^${name}:\\s*(.*)$`, 'm').exec(info)?.[1];
