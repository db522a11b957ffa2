import type { Minutes } from '../../domain/flavours';
import type { Problem } from '../model';

/** More set-ups than this in one room are bounded set-up by set-up instead of by the best order of all. */
const MOST_IN_ORDER = 10;

/** The shortest ways between set-ups, over others or a bare room of another day where that is shorter, and from a bare room. */
function shortestWays(problem: Problem, standing: boolean): { between: (from: number, to: number) => Minutes; fromBare: Minutes[] } {
  const count = problem.setups.length;
  const ways = Float64Array.from(problem.changeovers);
  for (let via = 0; via < count; via++)
    for (let from = 0; from < count; from++)
      for (let to = 0; to < count; to++)
        ways[from * count + to] = Math.min(ways[from * count + to]!, ways[from * count + via]! + ways[via * count + to]!);
  const change = (from: number, to: number) => ways[from * count + to]!;
  const fromBare = problem.setups.map((_, to) =>
    problem.setups.reduce((least, { rig }, from) => Math.min(least, from === to ? rig : rig + change(from, to)), Infinity),
  );
  const between = (from: number, to: number) => (standing || from === to ? change(from, to) : Math.min(change(from, to), fromBare[to]!));
  return { between, fromBare };
}

/**
 * The least minutes of rigs and changeovers that let every one of these set-ups stand once in a room, beginning bare: the way from the
 * first time that one stands to the first time of the next is never shorter than the shortest way between them. Best order by the dynamic
 * programme of Held and Karp (Journal of SIAM 10, 1962); for many set-ups, each costs at least its shortest entry.
 * @param standing whether set-ups stand overnight; else each may also be rigged in the bare room of another day
 */
export function leastBuilding(problem: Problem, setups: readonly number[], standing: boolean): Minutes {
  if (setups.length === 0) return 0;
  const { between, fromBare } = shortestWays(problem, standing);
  const size = setups.length;
  if (size > MOST_IN_ORDER) {
    const entries = setups.map((to) => Math.min(...setups.map((from) => (from === to ? fromBare[to]! : between(from, to))), fromBare[to]!));
    return entries.reduce((sum, entry) => sum + entry, 0);
  }
  const least = new Float64Array((1 << size) * size).fill(Infinity);
  setups.forEach((setup, last) => (least[(1 << last) * size + last] = fromBare[setup]!));
  for (let visited = 1; visited < 1 << size; visited++)
    for (let last = 0; last < size; last++) {
      const so = least[visited * size + last]!;
      if (so === Infinity) continue;
      for (let next = 0; next < size; next++) {
        if (visited & (1 << next)) continue;
        const at = (visited | (1 << next)) * size + next;
        least[at] = Math.min(least[at]!, so + between(setups[last]!, setups[next]!));
      }
    }
  const all = ((1 << size) - 1) * size;
  return Math.min(...least.subarray(all, all + size));
}

/** The least rig by which one of these set-ups comes to stand in a bare room. */
export function leastRig(problem: Problem, setups: readonly number[]): Minutes {
  const { fromBare } = shortestWays(problem, true);
  return Math.min(...setups.map((setup) => fromBare[setup]!));
}

/**
 * The least minutes of rigs and changeovers in a room along the dearest chain of passes that come one after another: each set-up of the
 * chain stands when its pass is played, and between two of them lies at least the shortest way.
 * @param placed passes that are surely placed, positions in the problem
 */
export function leastAlongChains(problem: Problem, room: number, placed: readonly number[]): Minutes {
  const { between, fromBare } = shortestWays(problem, problem.rooms[room]!.standing);
  const included = new Set(placed);
  /** By pass: the most minutes so far, by the set-up of the room that stood last on the way to it. */
  const known = new Map<number, Map<number, Minutes>>();
  const visit = (index: number): Map<number, Minutes> => {
    const before = known.get(index);
    if (before) return before;
    const most = new Map<number, Minutes>();
    // A pass in a ring of dependencies is met again before it is worked out; such a production is impossible anyway.
    known.set(index, most);
    const pass = problem.passes[index]!;
    const here = pass.room === room && pass.setup >= 0;
    if (here) most.set(pass.setup, fromBare[pass.setup]!);
    for (const { pass: earlier } of pass.after)
      if (included.has(earlier))
        for (const [setup, minutes] of visit(earlier)) {
          const stands = here ? pass.setup : setup;
          const sum = here ? minutes + between(setup, pass.setup) : minutes;
          most.set(stands, Math.max(most.get(stands) ?? 0, sum));
        }
    return most;
  };
  return placed.reduce((least, index) => Math.max(least, ...visit(index).values()), 0);
}
