import type { PassId } from '../../../domain/flavours';
import type { NecessaryCondition } from '../condition';
import { edgesThatHold, leftOut, type View } from '../view';
import { listWords, passWords } from '../words';

/** No pass comes, through others, after itself. A ring among passes that are no musts counts too: it is a mistake in the file. */
export const ring: NecessaryCondition = {
  name: 'ring',
  bare: true,
  subjects(view) {
    const shortest = new Map<string, PassId>();
    for (const id of view.statement.passes.keys()) {
      const cycle = cycleThrough(view, id);
      if (!cycle) continue;
      const key = [...cycle].sort().join(' ');
      if (!shortest.has(key)) shortest.set(key, id);
    }
    return [...shortest.values()];
  },
  fails(view, subject) {
    const cycle = cycleThrough(view, subject);
    if (!cycle) return null;
    const words = cycle.map((id) => passWords(view.statement, id));
    if (words.length === 1) return `${words[0]} waits for itself`;
    return `${listWords(words)} wait for each other in a ring`;
  },
};

/** The shortest ring through a pass, in the order in which its passes wait for each other. */
function cycleThrough(view: View, start: PassId): PassId[] | null {
  const { statement } = view;
  const stays = (id: PassId) => !leftOut(view, statement.passes.get(id)!);
  if (!stays(start)) return null;
  const cameFrom = new Map<PassId, PassId>();
  const queue = [start];
  for (let next = queue.shift(); next !== undefined; next = queue.shift()) {
    for (const edge of edgesThatHold(view, statement.edgesFrom.get(next) ?? []).filter(({ to }) => stays(to))) {
      if (edge.to === start) return pathTo(cameFrom, start, next);
      if (cameFrom.has(edge.to)) continue;
      cameFrom.set(edge.to, next);
      queue.push(edge.to);
    }
  }
  return null;
}

function pathTo(cameFrom: ReadonlyMap<PassId, PassId>, start: PassId, end: PassId): PassId[] {
  const path = [end];
  for (let at = end; at !== start; path.push(at)) at = cameFrom.get(at)!;
  return path.reverse();
}
