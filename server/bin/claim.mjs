// One process at a time in a data folder. No dependencies: runs before `npm ci`.
import fs from 'node:fs';
import path from 'node:path';

/** When a process began, in clock ticks since boot: with the pid it names one process, even after the pid was given to another. */
function beganAt(pid) {
  try {
    const stat = fs.readFileSync(`/proc/${pid}/stat`, 'utf8');
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19];
  } catch {
    return null; // no such process
  }
}

function read(file) {
  try {
    return JSON.parse(fs.readFileSync(file, 'utf8'));
  } catch {
    return null; // missing, or half written by a process that was killed
  }
}

/**
 * Takes the claim, or gives who holds it. A claim whose process is gone (kill -9, power cut) counts for nothing.
 * @param {string} file @param {Record<string, unknown>} facts told to whoever comes second
 * @returns {{ holder: Record<string, unknown> & { pid: number } } | { release: () => void }}
 */
export function claim(file, facts) {
  const mine = JSON.stringify({ ...facts, pid: process.pid, began: beganAt(process.pid) });
  fs.mkdirSync(path.dirname(file), { recursive: true });
  // Written aside and linked into place: a second process sees the whole claim or none, and only one link succeeds.
  const aside = `${file}.${process.pid}`;
  fs.writeFileSync(aside, mine);
  try {
    for (;;) {
      try {
        fs.linkSync(aside, file);
        return { release: () => read(file)?.pid === process.pid && fs.rmSync(file, { force: true }) };
      } catch (error) {
        if (error.code !== 'EEXIST') throw error;
      }
      const holder = read(file);
      if (holder && holder.began !== null && beganAt(holder.pid) === holder.began) return { holder };
      fs.rmSync(file, { force: true });
    }
  } finally {
    fs.rmSync(aside, { force: true });
  }
}
