import { spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import ICAL from 'ical.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import type { MadePlan } from '../../shared/contracts/plan';
import { writeProductionFile } from '../../shared/file/write';
import { aPass, emptyProduction } from '../factories/bare-production';

let folder: string;
beforeAll(() => (folder = mkdtempSync(path.join(os.tmpdir(), 'plan-sheets-'))));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

it('writes run sheets, call sheets and calendars beside the plan that it prints', { timeout: 120_000 }, () => {
  const pinned = (id: string, day: string, people: string[]) => aPass(id, { people, pin: { day: `2027-03-${day}` } });
  const file = emptyProduction([pinned('song', '08', ['mara', 'tobin']), pinned('again', '09', ['mara'])]);
  const place = path.join(folder, 'reed.yaml');
  writeFileSync(place, writeProductionFile(file));
  const sheets = path.join(folder, 'sheets');
  const run = spawnSync(process.execPath, ['server/bin/plan.mjs', place, '--iterations', '20', '--sheets', sheets], { encoding: 'utf8' });
  expect(run.status, run.stderr).toBe(0);
  const plan = JSON.parse(run.stdout) as MadePlan;
  expect(plan.calls).toHaveLength(3);

  const names = readdirSync(sheets).sort();
  const ending = (end: string) => names.filter((name) => name.endsWith(end));
  expect([ending('RUN-SHEET.pdf').length, ending('CALL-SHEET.pdf').length, ending('.ics').length]).toEqual([2, 2, 2]);
  for (const name of ending('.pdf')) expect(readFileSync(path.join(sheets, name)).subarray(0, 5).toString()).toBe('%PDF-');
  const calls = ending('.ics').flatMap((name) => {
    const calendar = new ICAL.Component(ICAL.parse(readFileSync(path.join(sheets, name), 'utf8')) as unknown[]);
    return calendar.getAllSubcomponents('vevent').map((event) => new ICAL.Event(event).startDate.toString().slice(0, 16));
  });
  expect(calls.sort()).toEqual(plan.calls.map(({ arrive }) => arrive).sort());
});
