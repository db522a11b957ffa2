import type { MadePlan, PlanItem } from '../contracts/plan';
import type { Pass, ProductionFile } from '../contracts/resources';
import type { PassId } from '../domain/flavours';
import { passInWords } from '../domain/passes';
import { placesOf, type Place } from '../solver/explain/places';
import { stateFile, type Statement } from '../solver/explain/statement';
import { viewOf } from '../solver/explain/view';
import { factWords, listWords, momentWords, personWords, roomWords, spanWords } from '../solver/explain/words';
import { clock as clockOf } from '../time/words';
import { effectivePasses } from './derive';
import { itemNamer, type ItemNamer } from './itemNames';

const MOST_FACTS = 4;
const MOST_PLACES = 3;
const MOST_FOLLOWERS = 3;
/** A fact that leaves a pass more than this share of its places is not what holds it. */
const WORTH_SAYING = 0.9;

interface Scene {
  file: ProductionFile;
  statement: Statement;
  plan: Pick<MadePlan, 'items'>;
  names: ItemNamer;
  pass: Pass;
}

/**
 * Why a pass is where a plan has it: what the file says of it, most narrowing first (pin, windows, hire, loud hours), what it waits for and
 * what waits for it, its neighbours on the same set-up, and what lies right before it. For a pass that is not placed, why not.
 */
export function whyHere(file: ProductionFile, plan: Pick<MadePlan, 'items'>, id: PassId): string[] {
  const statement = stateFile({ ...file, passes: effectivePasses(file) });
  const pass = statement.passes.get(id);
  if (!pass) return [];
  const scene: Scene = { file, statement, plan, names: itemNamer(file), pass };
  const item = placedItem(scene, id);
  if (!item) return whyNot(scene);
  const reasons = [
    ...narrowingFacts(scene),
    ...dependencies(scene, item),
    ...company(scene),
    ...setupNeighbours(scene, item),
    ...rightBefore(scene, item),
  ];
  return reasons.length > 0 ? reasons : ['Nothing ties it to this place: the whole plan costs least so.'];
}

const sentence = (words: string) => `${words.charAt(0).toUpperCase()}${words.slice(1)}.`;
const placedItem = ({ plan }: Scene, id: PassId) => plan.items.find((item) => item.kind === 'pass' && item.id === id);
const nameOf = ({ file, statement }: Scene, id: PassId) => {
  const pass = statement.passes.get(id);
  return pass ? passInWords(file, pass) : id;
};

function whyNot(scene: Scene): string[] {
  const { statement, pass } = scene;
  if (pass.leftOut === true) return ['It was left out by hand.'];
  if (placesOf(viewOf(statement, new Set()), pass).length === 0) return ['There is no time at all for it.', ...narrowingFacts(scene)];
  const lacking = statement.file.passes!.flatMap((other) => {
    const waits = (pass.after ?? []).some((one) => 'pass' in one && one.pass === other.id);
    return waits && !placedItem(scene, other.id) ? [nameOf(scene, other.id)] : [];
  });
  if (lacking.length > 0) return [`It comes after ${listWords(lacking)}, which is not in the plan either.`];
  return ['The plan costs less without it, or no place was left for it.'];
}

/** Facts of the file that leave it fewer places than the opening hours of its room, those that leave it least first. */
function narrowingFacts({ statement, pass }: Scene): string[] {
  const view = viewOf(statement, new Set());
  const places = placesOf(view, pass);
  const asked = [...view.asked];
  // Fields that name gear, loud hours or events only bind together with those, so they stay in while those are weighed one by one.
  const always = (fact: string) => /^rules\.|\.open$|^passes\.[^.]+(\.(setup|uses|loud|voice|after|before))?$/.test(fact);
  const roomWith = (fact: string | null) =>
    room(placesOf(viewOf(statement, new Set(asked.filter((one) => one !== fact && !always(one)))), pass));
  const all = roomWith(null);
  const facts = asked
    .filter((fact) => !always(fact))
    .map((fact) => ({ fact, left: roomWith(fact) }))
    .filter(({ left }) => left < all * WORTH_SAYING)
    .sort((one, other) => one.left - other.left || (one.fact < other.fact ? -1 : 1));
  if (facts.length === 0) return [];
  const words = facts.slice(0, MOST_FACTS).map(({ fact }) => sentence(factWords(statement, fact)));
  return places.length > 0 && places.length <= MOST_PLACES
    ? [...words, `So it can begin only ${placesInWords(statement, places)}.`]
    : words;
}

const room = (places: readonly Place[]): number => places.reduce((sum, { from, to }) => sum + to - from + 1, 0);

function placesInWords({ clock }: Statement, places: readonly Place[]): string {
  const words = places.map(({ from, to }) => {
    const span = { from: clock.wallOf(from), to: clock.wallOf(to) };
    return from === to ? momentWords(span.from) : spanWords(span);
  });
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} or ${words.at(-1)}`;
}

function dependencies(scene: Scene, item: PlanItem): string[] {
  const { statement, plan, pass } = scene;
  const earlier = [...statement.edgesFrom.values()].flat().filter((edge) => edge.to === pass.id);
  const after = earlier.flatMap((edge) => {
    const other = placedItem(scene, edge.from);
    if (!other) return [];
    const heard = plan.items.find((listen) => listen.kind === 'listen' && listen.start >= other.end && listen.end <= item.start);
    const approved = edge.approved && heard ? ` and is listened to ${momentWords(heard.start)}` : '';
    return [`It comes after ${nameOf(scene, edge.from)}, which ends ${momentWords(other.end)}${approved}.`];
  });
  const later = [...new Set((statement.edgesFrom.get(pass.id) ?? []).map((edge) => edge.to))].filter((id) => placedItem(scene, id));
  const waiting = later.slice(0, MOST_FOLLOWERS).map((id) => `${nameOf(scene, id)} (${momentWords(placedItem(scene, id)!.start)})`);
  if (later.length > MOST_FOLLOWERS) waiting.push(`${later.length - MOST_FOLLOWERS} more`);
  return waiting.length > 0 ? [...after, `${listWords(waiting)} ${waiting.length > 1 ? 'wait' : 'waits'} for it.`] : after;
}

/** Passes that start with it, and those it keeps out of the way of. */
function company(scene: Scene): string[] {
  const { statement, pass } = scene;
  const others = (pairs: readonly { one: string; other: string }[] | undefined) =>
    [...new Set((pairs ?? []).map(({ one, other }) => (one === pass.id ? other : one)))].map((id) => nameOf(scene, id));
  const together = others(statement.togetherWith.get(pass.id));
  const apart = others(statement.apartFrom.get(pass.id));
  return [
    ...(together.length > 0 ? [`It goes together with ${listWords(together)}.`] : []),
    ...(apart.length > 0 ? [`It is kept apart from ${listWords(apart)}.`] : []),
  ];
}

function setupNeighbours(scene: Scene, item: PlanItem): string[] {
  const { statement, plan, pass } = scene;
  if (pass.setup === undefined) return [];
  const name = statement.setups.get(pass.setup)?.name ?? pass.setup;
  const others = plan.items.filter(
    (other) => other.kind === 'pass' && other.room === item.room && other.setup !== undefined && other.id !== item.id,
  );
  const before = others.filter((other) => other.start < item.start).sort((one, other) => (one.start < other.start ? 1 : -1))[0];
  const after = others.filter((other) => other.start > item.start).sort((one, other) => (one.start < other.start ? -1 : 1))[0];
  const same = [before, after].flatMap((other) => (other && other.setup === pass.setup ? [scene.names(other)] : []));
  if (same.length > 0) return [`${name} stands for ${listWords(same)} too, so no changeover lies between them.`];
  const built = plan.items.filter(
    (one) => (one.kind === 'rig' || one.kind === 'changeover') && one.room === item.room && one.setup === pass.setup,
  );
  const last = built.filter((one) => one.end <= item.start).sort((one, other) => (one.start < other.start ? 1 : -1))[0];
  return last ? [`It follows ${scene.names(last)} (${momentWords(last.start)}–${clockOf(last.end)}).`] : [];
}

/** What ends in the minute in which it starts: its room or its people are not free before. */
function rightBefore(scene: Scene, item: PlanItem): string[] {
  const { statement, plan, names } = scene;
  const until = plan.items.filter((other) => other.end === item.start && other !== item);
  const inRoom = until.find((other) => other.room === item.room);
  const reasons = inRoom ? [`${roomWords(statement, item.room ?? '')} is taken by ${names(inRoom)} until then`] : [];
  for (const other of until) {
    if (other === inRoom || !['pass', 'event', 'listen'].includes(other.kind)) continue;
    const busy = other.people.filter((person) => item.people.includes(person)).map((person) => personWords(statement, person));
    if (busy.length > 0) reasons.push(`${listWords(busy)} ${busy.length > 1 ? 'are' : 'is'} in ${names(other)} until then`);
  }
  return reasons.map(sentence);
}
