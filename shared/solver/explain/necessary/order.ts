import type { Pass } from '../../../contracts/resources';
import type { Minute, PassId } from '../../../domain/flavours';
import type { NecessaryCondition } from '../condition';
import { coupleOf, soonestAfter, type Couple, type Gap } from '../couples';
import { onGrid, placesOf, type Place } from '../places';
import { minutesOf, neededPasses, roundUp, ruleOf, type View } from '../view';
import { passWords } from '../words';

/** Rounds until nothing more follows are few; a limit keeps rings of lags from going on minute by minute. */
const MOST_ROUNDS = 40;

/**
 * The passes that must be placed keep a place each when every two that bind each other push one another later and earlier: dependencies
 * with their lags and listens, passes together, and two that cannot run at once where only one order is left.
 */
export const order: NecessaryCondition = {
  name: 'order',
  subjects: () => ['all'],
  fails(view) {
    const empty = firstWithoutPlace(view);
    return empty && `In the order that is asked for, no time is left for ${passWords(view.statement, empty)}`;
  },
};

function firstWithoutPlace(view: View): PassId | null {
  const passes = neededPasses(view);
  const places = new Map(passes.map((pass) => [pass.id, placesOf(view, pass)]));
  const couples = passes.flatMap((one, i) => passes.slice(i + 1).flatMap((other) => coupleOf(view, one, other) ?? []));
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const before = [...places.values()].flat();
    for (const couple of couples) push(view, places, couple);
    listenFirst(view, places);
    for (const [id, left] of places) if (left.length === 0) return id;
    const after = [...places.values()].flat();
    if (after.length === before.length && after.every((place, i) => place.from === before[i]!.from && place.to === before[i]!.to))
      return null;
  }
  return null;
}

type Places = Map<PassId, Place[]>;
const earliest = (places: readonly Place[]): Minute => Math.min(Infinity, ...places.map(({ from }) => from));
const latest = (places: readonly Place[]): Minute => Math.max(-Infinity, ...places.map(({ to }) => to));

function push(view: View, places: Places, couple: Couple): void {
  const { one, other } = couple;
  if (couple.together) {
    const shared = (mine: readonly Place[], theirs: readonly Place[]) =>
      mine.flatMap((here) =>
        theirs.flatMap((there): Place[] => {
          const from = Math.max(here.from, there.from);
          const to = Math.min(here.to, there.to);
          return from <= to ? [{ ...here, from, to }] : [];
        }),
      );
    const ours = shared(places.get(one.id)!, places.get(other.id)!);
    places.set(other.id, shared(places.get(other.id)!, places.get(one.id)!));
    places.set(one.id, ours);
    return;
  }
  const unordered = couple.oneFirst !== null && couple.otherFirst !== null;
  if (unordered && couple.meet) return;
  const oneFirst = couple.oneFirst !== null && latest(places.get(other.id)!) >= soonest(view, places, one, couple.oneFirst);
  const otherFirst = couple.otherFirst !== null && latest(places.get(one.id)!) >= soonest(view, places, other, couple.otherFirst);
  if (oneFirst && otherFirst) return;
  if (oneFirst) follow(view, places, one, other, couple.oneFirst!);
  else if (otherFirst) follow(view, places, other, one, couple.otherFirst!);
  else places.set(one.id, []);
}

/** When a pass that follows can start at the earliest. */
function soonest(view: View, places: Places, first: Pass, gap: Gap): Minute {
  return soonestAfter(view, earliest(places.get(first.id)!) + minutesOf(view, first), gap);
}

function follow(view: View, places: Places, first: Pass, second: Pass, gap: Gap): void {
  const from = soonest(view, places, first, gap);
  places.set(second.id, since(view, places.get(second.id)!, from));
  const to = latest(places.get(second.id)!) - gap.least - minutesOf(view, first);
  places.set(
    first.id,
    places.get(first.id)!.flatMap((place) => (place.from <= to ? [{ ...place, to: Math.min(place.to, to) }] : [])),
  );
}

function since(view: View, places: readonly Place[], minute: Minute): Place[] {
  return places.flatMap((place) => {
    const from = place.from >= minute ? place.from : onGrid(view, minute);
    return from <= place.to ? [{ ...place, from }] : [];
  });
}

/** A room-day after the date by which some pass is surely captured begins with a listen. */
function listenFirst(view: View, places: Places): void {
  const listen = view.statement.rules.listen > 0 ? roundUp(view, ruleOf(view, 'listen')) : 0;
  if (listen === 0) return;
  let captured: string | null = null;
  for (const left of places.values()) {
    if (left.length === 0 || left.some(({ date }) => date === null)) continue;
    const last = left.reduce((latest, { date }) => (date! > latest ? date! : latest), '');
    if (captured === null || last < captured) captured = last;
  }
  if (captured === null) return;
  const by = captured;
  for (const [id, left] of places)
    places.set(
      id,
      left.flatMap((place) => {
        if (!place.window || place.window.date <= by) return [place];
        return since(view, [place], place.window.from + listen);
      }),
    );
}
