import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import http from 'node:http';
import os from 'node:os';
import path from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import type { ProductionFile } from '../../shared/contracts/resources';
import { callSheet, calledPeople } from '../../shared/domain/sheets/call-sheet';
import { runSheet } from '../../shared/domain/sheets/run-sheet';
import type { Paper, RunSheet } from '../../shared/domain/sheets/sheet';
import { NoBrowserError, PdfPrinter } from '../../server/sheets/pdf';
import { SheetPress } from '../../server/sheets/press';
import { writeSheets } from '../../server/sheets/write';
import { SHEET_DAYS, sheetFile, sheetPlan } from '../factories/sheet-sample';
import { askOfPdf, factOfPdf, textOfPdf } from '../support/pdf';

const edition = { version: 3, printed: '2026-12-01T14:30' };
const press = new SheetPress(process.env.CHROMIUM);
afterAll(() => press.close());

const pagesOf = (sheet: RunSheet) => sheet.rooms.reduce((sum, room) => sum + room.pages.length, 0) + 1;

function theRunSheet(date: string, paper?: Paper, file: ProductionFile = sheetFile()): RunSheet {
  const sheet = runSheet(file, sheetPlan(), { date, edition, ...(paper ? { paper } : {}) });
  if (!sheet) throw new Error('no sheet');
  return sheet;
}

describe('a printed run sheet', () => {
  it.each(Object.values(SHEET_DAYS))('of %s holds every item, time and person of the day', async (date) => {
    const sheet = theRunSheet(date);
    const text = textOfPdf(await press.runSheet(sheet));
    for (const room of sheet.rooms) {
      expect(text).toContain(room.room);
      for (const line of room.pages.flatMap((page) => page.lines)) {
        if (line.is !== 'row') continue;
        expect(text).toContain(line.from);
        expect(text).toContain(`–${line.to}`);
        if (line.code) expect(text).toContain(line.code);
        // Names in other scripts depend on the machine's own fonts and on the reader's order of signs.
        for (const person of line.people.filter((name) => /^\p{Script=Latin}+$/u.test(name))) expect(text).toContain(person);
      }
    }
  });

  it('has the header, the page of pages and the version on every page', async () => {
    const sheet = theRunSheet(SHEET_DAYS.full);
    const pdf = await press.runSheet(sheet);
    const pages = textOfPdf(pdf).split('\f').slice(0, -1);
    expect(pages).toHaveLength(pagesOf(sheet));
    for (const [index, page] of pages.entries()) {
      for (const words of ['SLUICE', 'Nine Sluices', 'Tue 9 March 2027', 'day 2 of 3', 'Version 3', 'printed Tue 1 December 2026 14:30'])
        expect(page).toContain(words);
      expect(page).toContain(`Page ${index + 1} of ${pages.length}`);
    }
  });

  it.each([
    ['A4', '59[45].\\d+ x 841.\\d+ pts \\(A4\\)'],
    ['Letter', '612 x 792 pts \\(letter\\)'],
  ] as const)('fits %s, page by page as laid out', async (paper, size) => {
    for (const date of Object.values(SHEET_DAYS)) {
      const sheet = theRunSheet(date, paper);
      const info = askOfPdf('pdfinfo', await press.runSheet(sheet));
      expect(factOfPdf(info, 'Page size')).toMatch(new RegExp(`^${size}`));
      expect(Number(factOfPdf(info, 'Pages'))).toBe(pagesOf(sheet));
    }
  });

  it('runs on in order where names and titles are long, and no page spills over', async () => {
    const file = sheetFile();
    for (const person of file.people) person.short = `${person.short ?? person.id} Montalvo-Szymborska the Younger`;
    file.production.title =
      'Nine Sluices, or the Long and Winding History of a Lock-keeper Who Could Not Swim, in Seven Songs and an Afterthought';
    for (const room of file.rooms) room.name = `${room.name}, the Large One behind the Kiln with the Green Door`;
    for (const song of file.songs) song.title = `${song.title} and the Seventeen Further Verses that Nobody Sang Before`;
    for (const paper of ['A4', 'Letter'] as const) {
      const sheet = theRunSheet(SHEET_DAYS.full, paper, file);
      expect(Number(factOfPdf(askOfPdf('pdfinfo', await press.runSheet(sheet)), 'Pages'))).toBe(pagesOf(sheet));
    }
  });

  it('is tagged, has a title and a language, and brings its fonts along', async () => {
    const pdf = await press.runSheet(theRunSheet(SHEET_DAYS.first));
    const info = askOfPdf('pdfinfo', pdf);
    expect(factOfPdf(info, 'Tagged')).toBe('yes');
    expect(factOfPdf(info, 'Title')).toBe('Nine Sluices: run sheet Mon 8 March 2027, Version 3');
    expect(Buffer.from(pdf).toString('latin1')).toMatch(/\/Lang \(en\)/);
    const fonts = askOfPdf('pdffonts', pdf).split('\n').slice(2).filter(Boolean);
    expect(fonts.some((line) => line.includes('AtkinsonHyperlegible-Bold'))).toBe(true);
    // Columns of pdffonts: name, type, encoding, emb, sub, uni, object.
    for (const line of fonts) expect(line).toMatch(/\s(yes)\s+(yes|no)\s+(yes|no)\s+\d+\s+\d+$/);
  });

  it('says DRAFT where the plan is none that was published', async () => {
    const sheet = runSheet(sheetFile(), sheetPlan(), { date: SHEET_DAYS.first, edition: { ...edition, version: null } })!;
    const text = textOfPdf(await press.runSheet(sheet));
    expect(text).toContain('DRAFT');
    expect(text).not.toContain('Version');
  });

  it('shows markup as text', async () => {
    const text = textOfPdf(await press.runSheet(theRunSheet(SHEET_DAYS.first))).replaceAll(/\s+/g, ' ');
    expect(text).toContain('<img src=x');
    expect(press.refused).toBe(0);
  });
});

describe('a printed call sheet', () => {
  it('holds the times, the songs and the facts of that person, for everybody', async () => {
    for (const person of calledPeople(sheetFile(), sheetPlan())) {
      for (const paper of ['A4', 'Letter'] as const) {
        const sheet = callSheet(sheetFile(), sheetPlan(), { person, edition, paper })!;
        const pdf = await press.callSheet(sheet);
        const text = textOfPdf(pdf);
        for (const day of sheet.pages.flatMap((page) => page.days)) {
          for (const words of [day.day, day.arrive, day.ready, day.release.earliest, day.release.likely, day.release.latest])
            expect(text).toContain(words);
          for (const line of day.lines) expect(text).toContain(line.from);
        }
        expect(text).toContain('Ring Jo, +00 555 0101');
        expect(Number(factOfPdf(askOfPdf('pdfinfo', pdf), 'Pages'))).toBe(sheet.pages.length);
      }
    }
  });

  it('has the name large and breaks no long one', async () => {
    const file = sheetFile();
    file.people[0]!.name = 'Maximiliana Theodora Quillfeather-Szymborska of the Upper Lock';
    const sheet = callSheet(file, sheetPlan(), { person: 'mara', edition })!;
    const pdf = await press.callSheet(sheet);
    expect(textOfPdf(pdf).replaceAll(/\s+/g, ' ')).toContain('Maximiliana Theodora');
    expect(Number(factOfPdf(askOfPdf('pdfinfo', pdf), 'Pages'))).toBe(sheet.pages.length);
  });
});

describe('the printer', () => {
  it('lets a page reach nothing, on this machine or elsewhere', async () => {
    let hits = 0;
    const server = http.createServer((_request, response) => {
      hits++;
      response.end();
    });
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    const { port } = server.address() as { port: number };
    const at = (name: string) => `http://127.0.0.1:${port}/${name}`;
    const printer = new PdfPrinter(process.env.CHROMIUM);
    try {
      await printer.print(
        `<link rel="stylesheet" href="${at('css')}"><link rel="prefetch" href="${at('prefetch')}"><style>@import "${at('import')}"; body { background: url(${at('url')}) }</style>
         <img src="${at('img')}"><iframe src="${at('iframe')}"></iframe><object data="${at('object')}"></object><script src="${at('script')}"></script>
         <script>fetch("${at('fetch')}")</script><img src="file:///etc/passwd"><img src="http://example.org/x.png">`,
      );
      expect(hits).toBe(0);
      expect(printer.refused).toBeGreaterThan(5);
    } finally {
      await printer.close();
      server.close();
    }
  });

  it('prints on after its browser died', async () => {
    const printer = new PdfPrinter(process.env.CHROMIUM);
    try {
      await printer.print('<p>one</p>');
      const children = execFileSync('ps', ['-o', 'pid=,args=', '--ppid', String(process.pid)], { encoding: 'utf8' });
      const own = children.split('\n').filter((line) => line.includes('redpoll-print-'));
      expect(own.length).toBeGreaterThan(0);
      for (const line of own) process.kill(Number.parseInt(line, 10), 'SIGKILL');
      expect(textOfPdf(await printer.print('<p>two</p>'))).toContain('two');
    } finally {
      await printer.close();
    }
  });

  it('prints many sheets asked for at once', async () => {
    const sheet = theRunSheet(SHEET_DAYS.first);
    const pdfs = await Promise.all(Array.from({ length: 12 }, () => press.runSheet(sheet)));
    for (const pdf of pdfs) expect(textOfPdf(pdf)).toContain('Weir Song');
  });

  it('says what to install where there is no browser', async () => {
    const printer = new PdfPrinter('/nonexistent/chromium');
    await expect(printer.print('<p>one</p>')).rejects.toThrow(NoBrowserError);
  });
});

describe('a plan’s sheets in a folder', () => {
  it('are a run sheet for each day, a call sheet and a calendar for each person, under names that every system takes', async () => {
    const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'redpoll-sheets-'));
    try {
      const names = await writeSheets(sheetFile(), sheetPlan(), path.join(folder, 'new'), { now: new Date('2026-12-01T14:30:00Z') });
      expect(fs.readdirSync(path.join(folder, 'new')).sort()).toEqual([...names].sort());
      expect(names.filter((name) => name.endsWith('RUN-SHEET.pdf'))).toEqual([
        'SLUICE_DRAFT_2027-03-08_RUN-SHEET.pdf',
        'SLUICE_DRAFT_2027-03-09_RUN-SHEET.pdf',
        'SLUICE_DRAFT_2027-03-10_RUN-SHEET.pdf',
      ]);
      expect(names).toContain('SLUICE_DRAFT_MARA_CALL-SHEET.pdf');
      expect(names).toHaveLength(3 + 7 + 7);
      for (const name of names) expect(name).toMatch(/^[A-Z0-9_-]+\.(pdf|ics)$/);
      const calendar = fs.readFileSync(path.join(folder, 'new', 'SLUICE_DRAFT_MARA_CALLS.ics'), 'utf8');
      expect(calendar.match(/STATUS:TENTATIVE/g)).toHaveLength(3);
    } finally {
      fs.rmSync(folder, { recursive: true });
    }
  });
});
