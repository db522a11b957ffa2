import { open, stat } from 'node:fs/promises';
import path from 'node:path';
import type { Fault } from '../../shared/contracts/api';
import type { PlanOutcome } from '../../shared/contracts/plan';
import type { ProductionFile } from '../../shared/contracts/resources';
import { LIMITS } from '../../shared/file/limits';
import { readProductionFile } from '../../shared/file/read';
import { effectivePasses } from '../../shared/planner/derive';
import { planProduction } from '../../shared/planner/plan';
import { checkPlan } from '../../shared/solver/check/check';
import { readArguments, USAGE, type PlanArguments } from './planArguments';

/** Exit statuses of the command. */
const EXIT = { planned: 0, ours: 1, wrong: 2, impossible: 3, unsolved: 4 } as const;
/** Odds and the writing of the answer follow the search. They take less than half the time that the reading took, on fast machines and slow ones. */
const RESERVED_SHARE = 0.5;
const LEAST_RESERVED_MS = 80;

/** Where the command's answer goes, and what it has to say beside it. */
export interface Speech {
  answer: (text: string) => void;
  complain: (line: string) => void;
}
const STREAMS: Speech = {
  answer: (text) => void process.stdout.write(`${text}\n`),
  complain: (line) => void process.stderr.write(`${line}\n`),
};

/**
 * Plans a production file and prints the outcome as one JSON object.
 * @param args what was typed after the command
 * @param from the folder from which file names are seen
 * @returns the exit status
 */
export async function planCommand(args: string[], from: string, speech: Speech = STREAMS): Promise<number> {
  const { complain } = speech;
  const asked = readArguments(args);
  if (asked === 'help') {
    speech.answer(USAGE);
    return EXIT.planned;
  }
  if ('wrong' in asked) {
    complain(`plan: ${asked.wrong}\n\n${USAGE}`);
    return EXIT.wrong;
  }
  const folder = asked.sheets === undefined ? undefined : path.resolve(from, asked.sheets);
  if (folder !== undefined && (await isFile(folder))) {
    complain(`plan: --sheets wants a folder, and ${asked.sheets} is a file\n\n${USAGE}`);
    return EXIT.wrong;
  }
  const began = performance.now();
  const file = await readFile(asked.file, path.resolve(from, asked.file), complain);
  if (!file) return EXIT.wrong;

  const outcome = plan(file, asked, began);
  const found = outcome.cost === null ? [] : checkPlan({ ...file, passes: effectivePasses(file) }, outcome).violations;
  if (found.length > 0) {
    complain('The plan that was found breaks rules, so it is not given out. This is a fault of ours:');
    for (const { rule, says } of found) complain(`  ${rule}: ${says}`);
    return EXIT.ours;
  }
  speech.answer(JSON.stringify(answer(outcome, (performance.now() - began) / 1000)));
  if (folder !== undefined && !(await writeSheetsTo(folder, file, outcome, complain))) return EXIT.ours;
  if (outcome.status === 'impossible') return EXIT.impossible;
  return outcome.status === 'unsolved' ? EXIT.unsolved : EXIT.planned;
}

function plan(file: ProductionFile, { seconds, iterations, seed }: PlanArguments, began: number): PlanOutcome {
  const reserved = Math.max(LEAST_RESERVED_MS, RESERVED_SHARE * (performance.now() - began));
  const limit = seconds === undefined ? Infinity : Math.max(0, seconds * 1000 - reserved);
  const now = () => performance.now();
  return planProduction(file, { seed, iterations, now, stop: () => now() - began >= limit });
}

/** The fields in the order in which people read them, seconds to the millisecond. */
function answer({ status, cost, bound, items, calls, unplaced, odds, conflicts }: PlanOutcome, seconds: number) {
  return { status, cost, bound, seconds: Math.round(seconds * 1000) / 1000, items, calls, unplaced, odds, conflicts };
}

async function isFile(place: string): Promise<boolean> {
  return stat(place).then(
    (found) => !found.isDirectory(),
    () => false,
  );
}

/** The production, or nothing once its faults were told. Warnings are told either way. */
async function readFile(name: string, place: string, complain: Speech['complain']): Promise<ProductionFile | undefined> {
  const tell = ({ line, path: where, expected }: Fault, kind = '') => complain(`${name}:${line ?? 1}: ${where}: ${kind}${expected}`);
  const text = await readText(place);
  if ('expected' in text) {
    tell({ path: 'file', expected: text.expected });
    return undefined;
  }
  const read = readProductionFile(text.text);
  for (const warning of read.warnings) tell(warning, 'warning: ');
  if (read.ok) return read.file;
  for (const fault of read.faults) tell(fault);
  return undefined;
}

/** The text of a file, read no further than a production file may be long. */
async function readText(place: string): Promise<{ text: string } | { expected: string }> {
  const chunks: Uint8Array[] = [];
  try {
    const handle = await open(place);
    try {
      let bytes = 0;
      for await (const chunk of handle.createReadStream({ autoClose: false, end: LIMITS.bytes }) as AsyncIterable<Uint8Array>) {
        chunks.push(chunk);
        bytes += chunk.length;
      }
      if (bytes > LIMITS.bytes) return { expected: `a file of at most ${LIMITS.bytes / 1024 / 1024} MB` };
    } finally {
      await handle.close();
    }
  } catch (error) {
    return { expected: unreadable(error) };
  }
  try {
    return { text: new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(Buffer.concat(chunks)) };
  } catch {
    return { expected: 'text in UTF-8' };
  }
}

function unreadable(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : '';
  if (code === 'ENOENT' || code === 'ENOTDIR') return 'a file that exists';
  if (code === 'EISDIR') return 'a file, not a folder';
  if (code === 'EACCES' || code === 'EPERM') return 'a file that may be read';
  return `a file that can be read (${code || String(error)})`;
}

/** Whether all is well; where not, what went wrong was told. */
async function writeSheetsTo(folder: string, file: ProductionFile, outcome: PlanOutcome, complain: Speech['complain']): Promise<boolean> {
  if (outcome.cost === null) {
    complain('There is no plan, so no sheets were written.');
    return true;
  }
  try {
    const { writeSheets } = await import('../sheets/write');
    await writeSheets(file, outcome, folder, { now: new Date(), chromium: process.env.CHROMIUM });
    return true;
  } catch (error) {
    complain(`The plan is printed, but its sheets are not written: ${error instanceof Error ? error.message : String(error)}`);
    return false;
  }
}
