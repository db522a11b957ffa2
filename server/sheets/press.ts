import type { CallSheet, RunSheet } from '../../shared/domain/sheets/sheet';
import { callSheetHtml, runSheetHtml } from './html';
import { PdfPrinter } from './pdf';
import { readSheetStyles } from './styles';

/** Sheets as PDF: the templates, their styles and the printer, made once and kept. */
export class SheetPress {
  readonly #printer: PdfPrinter;
  #styles: Promise<string> | null = null;

  constructor(chromium?: string) {
    this.#printer = new PdfPrinter(chromium);
  }

  /** Starts the browser and reads the styles ahead of the first sheet. */
  async warmUp(): Promise<void> {
    await Promise.all([this.#read(), this.#printer.warmUp()]);
  }

  /** @throws NoBrowserError, PrintError */
  async runSheet(sheet: RunSheet): Promise<Uint8Array> {
    return this.#printer.print(await runSheetHtml(sheet, await this.#read()));
  }

  /** @throws NoBrowserError, PrintError */
  async callSheet(sheet: CallSheet): Promise<Uint8Array> {
    return this.#printer.print(await callSheetHtml(sheet, await this.#read()));
  }

  /** How many requests of printed pages were refused; a right document makes none. */
  get refused(): number {
    return this.#printer.refused;
  }

  close(): Promise<void> {
    return this.#printer.close();
  }

  #read(): Promise<string> {
    this.#styles ??= readSheetStyles();
    return this.#styles;
  }
}
