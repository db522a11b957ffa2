import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import path from 'node:path';

const FACES = ['400.css', '700.css', '400-italic.css'];

/** The rules of the sheet's face with the font files as data, so that a page needs nothing from outside. */
async function readFontCss(): Promise<string> {
  const { resolve } = createRequire(path.join(process.cwd(), 'package.json'));
  const rules = FACES.map(async (face) => {
    const styles = resolve(`@fontsource/atkinson-hyperlegible/${face}`);
    const css = await readFile(styles, 'utf8');
    const inlined = css.split(/(src:[^;]*;)/).map(async (piece) => {
      const file = /url\((\.\/files\/[^)]+\.woff2)\)/.exec(piece)?.[1];
      if (file === undefined) return piece;
      const data = await readFile(path.resolve(path.dirname(styles), file), 'base64');
      return `src: url(data:font/woff2;base64,${data}) format('woff2');`;
    });
    return (await Promise.all(inlined)).join('');
  });
  return (await Promise.all(rules)).join('\n');
}

const SHEETS = ['print.css', 'print-run.css', 'print-call.css'];

/** Everything that a printed document needs to look right: its face and the styles of templates/, which the preview uses too. */
export async function readSheetStyles(): Promise<string> {
  const styles = SHEETS.map((name) => readFile(path.join(process.cwd(), 'templates', name), 'utf8'));
  return (await Promise.all([readFontCss(), ...styles])).join('\n');
}
