import { execFileSync } from 'node:child_process';

/** The text of a PDF as poppler reads it, lines as they stand on the page. */
export const textOfPdf = (pdf: Uint8Array): string => execFileSync('pdftotext', ['-layout', '-', '-'], { input: pdf, encoding: 'utf8' });
