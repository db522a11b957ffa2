import type { Dependency, Pass, ProductionFile } from '../../../shared/contracts/resources';
import type { PassId } from '../../../shared/domain/flavours';
import { passInWords } from '../../../shared/domain/passes';
import { namesOf, partsOf } from '../../../shared/domain/sheets/names';
import { partsInWords } from '../../../shared/domain/sheets/pass-words';
import { estimateOf } from '../../../shared/planner/derive';
import { pinInWords } from '../../../shared/planner/moves';
import { length } from '../../../shared/time/words';

/** A line of the detail of a pass. */
export interface PassFact {
  label: string;
  words: string;
}

/** What is known of a pass, in words, but for where the plan has put it. */
export function passFacts(file: ProductionFile, id: PassId): PassFact[] {
  const names = namesOf(file);
  const pass = names.pass(id);
  if (!pass) return [];
  const words = (other: PassId): string => {
    const known = names.pass(other);
    return known ? passInWords(file, known) : other;
  };
  const needs = (one: Dependency): string => {
    const what = 'pass' in one ? `${words(one.pass)}${one.kind === 'approved' ? ' is listened to' : ''}` : names.event(one.event);
    return one.lag ? `${what}, ${length(one.lag)} later` : what;
  };
  const before = (pass.before ?? []).map((one) => ('pass' in one ? words(one.pass) : names.event(one.event)));
  const facts: [string, string | undefined][] = [
    ['Parts', partsInWords(partsOf(pass, names.song(pass.song))) || undefined],
    ['People', (pass.people ?? []).map(names.short).join(', ') || undefined],
    ['Set-up', pass.setup === undefined ? undefined : names.setup(pass.setup)],
    ['Minutes', minutesInWords(pass)],
    ['Priority', pass.priority],
    ['Sound', pass.loud ? 'loud' : pass.quiet ? 'quiet: nothing loud beside it' : undefined],
    ['Uses', (pass.uses ?? []).map((use) => file.gear.find(({ id: gear }) => gear === use.gear)?.name ?? use.gear).join(', ') || undefined],
    ['After', (pass.after ?? []).map(needs).join('; ') || undefined],
    ['Before', before.join('; ') || undefined],
    ['Together with', (pass.together ?? []).map(words).join('; ') || undefined],
    ['Apart from', (pass.apart ?? []).map(words).join('; ') || undefined],
    ['Pinned', pass.pin ? pinInWords(pass.pin) : undefined],
    ['Note', pass.note],
  ];
  return facts.flatMap(([label, said]) => (said === undefined ? [] : [{ label, words: said }]));
}

function minutesInWords(pass: Pass): string {
  const [low, likely, high] = estimateOf(pass.minutes);
  return low === high ? length(likely) : `${length(likely)} likely, ${length(low)} to ${length(high)}`;
}
