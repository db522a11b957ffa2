// What the start scripts say, and how they say that something went wrong. No dependencies: runs before `npm ci`.

/** Something a person can mend: what happened, and the next step. */
export class Trouble extends Error {
  /** @param {string} what @param {string} next */
  constructor(what, next) {
    super(what);
    this.next = next;
  }
}

/** @param {string} line */
export const say = (line) => console.log(line);

const seconds = (since) => `${((performance.now() - since) / 1000).toFixed(1)} s`;

/**
 * Says what begins, repeats that it goes on (nobody likes a silent minute), and says how long it took.
 * @template T
 * @param {string} what
 * @param {() => Promise<T>} work
 * @returns {Promise<T>}
 */
export async function step(what, work) {
  const began = performance.now();
  say(`- ${what} …`);
  const reminder = setInterval(() => say(`  still at it (${seconds(began)})`), 20_000);
  try {
    const result = await work();
    say(`  done in ${seconds(began)}`);
    return result;
  } finally {
    clearInterval(reminder);
  }
}

const FULL = /ENOSPC|EDQUOT|No space left on device|Disk quota exceeded/i;
const OFFLINE =
  /ENOTFOUND|EAI_AGAIN|ECONNREFUSED|ECONNRESET|ETIMEDOUT|ENETUNREACH|network|Temporary failure resolving|Could not resolve|Unable to connect|Failed to fetch/i;

/**
 * Turns the output of a failed program into a sentence with a next step.
 * @param {string} what the step that failed
 * @param {string} output what the program wrote
 * @param {{ network?: boolean }} [needs] whether it loads something, so that words about a network mean one
 */
export function troubleFrom(what, output, { network = false } = {}) {
  const tail = output.trim().split('\n').slice(-12).join('\n');
  if (FULL.test(output)) return new Trouble(`${what}: the disk is full.`, 'Free about 1 GB (df -h shows where), then start again.');
  if (network && OFFLINE.test(output))
    return new Trouble(
      `${what}: the network did not answer.\n${output.split('\n').find((line) => OFFLINE.test(line))}`,
      'Connect this machine to the network (only this step needs it), then start again.',
    );
  return new Trouble(`${what} did not work. Its last words:\n${tail}`, 'Mend that, then start again; what is done already is kept.');
}

const REASONS = {
  ENOSPC: ['the disk is full', 'Free some space (df -h shows where), then start again.'],
  EDQUOT: ['your disk quota is used up', 'Free some space, then start again.'],
  EACCES: ['this user may not write there', 'Give this user the folder (chown), or set REDPOLL_DATA to another one.'],
  EPERM: ['this user may not do that', 'Give this user the folder (chown), or set REDPOLL_DATA to another one.'],
  EROFS: ['that disk is read-only', 'Set REDPOLL_DATA to a folder that can be written.'],
};

/**
 * Prints what went wrong, with the next step; a stack trace only where nobody foresaw the error.
 * @param {unknown} error
 */
export function tellTrouble(error) {
  if (error instanceof Trouble) {
    console.error(`\n${error.message}\n→ ${error.next}`);
    return;
  }
  const known = error instanceof Error && 'code' in error ? REASONS[error.code] : undefined;
  if (known) console.error(`\n${error.message.split('\n')[0]} (${known[0]}).\n→ ${known[1]}`);
  else console.error(`\nSomething nobody foresaw went wrong:\n${error instanceof Error ? error.stack : error}`);
}
