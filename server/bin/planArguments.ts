import { parseArgs } from 'node:util';

export interface PlanArguments {
  file: string;
  /** Time limit; absent where only iterations limit the search, so that they alone decide what comes out. */
  seconds?: number;
  iterations?: number;
  seed: number;
  /** Folder for the sheets. */
  sheets?: string;
}

export const USAGE = `usage: npm run --silent plan -- FILE.yaml [--seconds 10] [--iterations N] [--seed 1] [--sheets DIR]

  --seconds N      plan for at most so long (10; without limit where only --iterations is given)
  --iterations N   try so many timetables: the same file, seed and number give the same plan anywhere
  --seed N         another seed, another search (1)
  --sheets DIR     also write run sheets and call sheets as PDF, and a calendar for each person

Prints one JSON object. Exit status: 0 planned, 2 the file is wrong, 3 impossible, 4 no plan found in the time, 1 a fault of ours.`;

const DEFAULT_SECONDS = 10;
const MOST_SECONDS = 86_400;

/** What was asked for, or what is wrong with it in a sentence. */
export function readArguments(args: string[]): PlanArguments | 'help' | { wrong: string } {
  let given;
  try {
    const text = { type: 'string' } as const;
    const options = { seconds: text, iterations: text, seed: text, sheets: text, help: { type: 'boolean' } } as const;
    given = parseArgs({ args, allowPositionals: true, options });
  } catch (error) {
    return { wrong: error instanceof Error ? error.message.split(/[.\n]/)[0]! : String(error) };
  }
  const { values, positionals } = given;
  if (values.help) return 'help';
  const [file] = positionals;
  if (file === undefined) return { wrong: 'a file is missing' };
  if (positionals.length > 1) return { wrong: `one file at a time, not ${positionals.length}` };
  const seconds = numberOf(values.seconds, 0, MOST_SECONDS);
  if (seconds === 'wrong') return { wrong: `--seconds wants a number from 0 to ${MOST_SECONDS}, not ${values.seconds}` };
  const iterations = wholeOf(values.iterations, 1, Number.MAX_SAFE_INTEGER);
  if (iterations === 'wrong') return { wrong: `--iterations wants a whole number of at least 1, not ${values.iterations}` };
  const seed = wholeOf(values.seed, 0, 0xffff_ffff);
  if (seed === 'wrong') return { wrong: `--seed wants a whole number from 0 to 4294967295, not ${values.seed}` };
  if (values.sheets === '') return { wrong: '--sheets wants a folder' };
  const limit = seconds ?? (iterations === undefined ? DEFAULT_SECONDS : undefined);
  return { file, seconds: limit, iterations, seed: seed ?? 1, sheets: values.sheets };
}

function numberOf(text: string | undefined, least: number, most: number): number | 'wrong' | undefined {
  if (text === undefined) return undefined;
  const number = /^\d+(\.\d+)?$/.test(text) ? Number(text) : NaN;
  return number >= least && number <= most ? number : 'wrong';
}

function wholeOf(text: string | undefined, least: number, most: number): number | 'wrong' | undefined {
  const number = numberOf(text, least, most);
  return typeof number === 'number' && !Number.isInteger(number) ? 'wrong' : number;
}
