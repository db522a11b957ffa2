import type { Minutes } from './flavours';
import type { PartMode } from '../contracts/values';

/**
 * How long recording work usually takes, in minutes. Every figure is common practice of the trade with no published source, and every
 * figure of a production beats it. Likely values are the middle of the usual range, rounded to five minutes: nothing here is known better.
 */

export type Estimate = [low: Minutes, likely: Minutes, high: Minutes];

/** How well a song is known: 0 unplayed, 2 the form is known, 4 played on stage. */
export type RehearsalLevel = number;
/** Assumed where a song says nothing. */
export const USUAL_LEVEL: RehearsalLevel = 3;

interface BasicsRow {
  from: RehearsalLevel;
  takes: number;
  usual: [Minutes, Minutes];
  spread: [low: number, high: number];
}

/**
 * A song's basic takes by rehearsal level (common practice, no source): levels 3–4 take 45–75, level 2 takes 90–150. Below level 2
 * rehearsing first is wiser; the upper end is assumed.
 */
const BASICS: BasicsRow[] = [
  { from: 4, takes: 3, usual: [45, 75], spread: [0.8, 1.6] },
  { from: 3, takes: 4, usual: [45, 75], spread: [0.8, 1.6] },
  { from: 2, takes: 6, usual: [90, 150], spread: [0.8, 2.2] },
];
const UNREHEARSED: BasicsRow = { from: 0, takes: 6, usual: [150, 150], spread: [0.8, 2.2] };

interface OverdubRow {
  kind: string;
  /** Words of an instrument's or a part's name that tell the kind; the first row with a hit holds. */
  words: RegExp;
  usual: [Minutes, Minutes];
  /** Leads and solos spread wider than other parts. */
  exposed?: true;
}

/** Overdubs per song by instrument (common practice, no source). */
const OVERDUBS: OverdubRow[] = [
  { kind: 'solo', words: /\bsolo/i, usual: [20, 30], exposed: true },
  { kind: 'backing voices', words: /\b(backing|harmon(y|ies)|choir|chorus|gang|bvs?)\b/i, usual: [30, 45] },
  { kind: 'lead voice', words: /\b(voices?|vocals?|vox|sing(er|ing)?)\b|^lead$/i, usual: [45, 120], exposed: true },
  { kind: 'percussion', words: /\b(perc|percussion|shaker|tambourine|congas?|bongos?|claps?|bells?)\b/i, usual: [10, 15] },
  { kind: 'horns', words: /\b(horns?|brass|sax\w*|trumpet|trombone|tuba|cornet|fl[uü]gelhorn|clarinet|flute)\b/i, usual: [40, 60] },
  { kind: 'strings', words: /\b(strings?|violins?|viola|cello|fiddle)\b/i, usual: [40, 60] },
  { kind: 'keys', words: /\b(keys|keyboards?|piano|organ|synth\w*|clavinet|harmonium|accordion|vib(es|raphone))\b/i, usual: [30, 45] },
  { kind: 'bass', words: /\bbass\b/i, usual: [30, 45] },
  // 30–60 for the part and 15 to find the tone.
  { kind: 'electric guitar', words: /\b(electric|e-?guitar|lead guitar|slide|pedal steel)\b/i, usual: [45, 75] },
  { kind: 'acoustic guitar', words: /\b(acoustic|guitar|banjo|mandolin|ukulele|harp)\b/i, usual: [30, 45] },
];
const OTHER_OVERDUB: OverdubRow = { kind: 'other', words: /^/, usual: [30, 60] };

/** A three-part stack, doubled (common practice, no source). */
const STACK: [Minutes, Minutes] = [60, 90];
/** A drop-in repair of a part (common practice, no source). */
const REPAIR: [Minutes, Minutes] = [15, 25];
/** A double takes 0.6–0.7 of the first pass (common practice, no source). */
const DOUBLE_SHARE = 0.65;
const EXPOSED_SPREAD: [number, number] = [0.6, 2];

/** A take slot of basics: run-through, takes with talk between them, one or two playbacks in the control room, fixes (common practice, no source). */
const RUN_THROUGH: Minutes = 10;
const BETWEEN_TAKES: Minutes = 2.5;
const PLAYBACK_OF_LENGTH = 1.2 * 1.5;
const FIXES: Minutes = 12.5;

const toFive = (minutes: number): Minutes => Math.max(5, Math.round(minutes / 5) * 5);
const middle = ([low, high]: [Minutes, Minutes]): Minutes => (low + high) / 2;
const spreadAround = (likely: number, [low, high]: [number, number]): Estimate => [
  toFive(likely * low),
  toFive(likely),
  toFive(likely * high),
];

function basicsRow(level: RehearsalLevel): BasicsRow {
  return BASICS.find((row) => level >= row.from) ?? UNREHEARSED;
}

/**
 * Minutes of the live and guide parts of a song taken together.
 * @param level rehearsal level 0–4
 * @param songLength minutes of music, such as 4.2; without it the middle of the usual range holds
 */
export function basicsMinutes(level: RehearsalLevel = USUAL_LEVEL, songLength?: number): Estimate {
  const { takes, usual, spread } = basicsRow(level);
  if (songLength === undefined) return spreadAround(middle(usual), spread);
  const slot = RUN_THROUGH + takes * (songLength + BETWEEN_TAKES) + PLAYBACK_OF_LENGTH * songLength + FIXES;
  return spreadAround(Math.max(slot, usual[0]), spread);
}

/**
 * Minutes of one part that is added to a song.
 * @param instrument what is played, in the production's own words
 */
export function overdubMinutes(
  mode: Exclude<PartMode, 'live' | 'guide'>,
  instrument: string,
  level: RehearsalLevel = USUAL_LEVEL,
): Estimate {
  const row = OVERDUBS.find(({ words }) => words.test(instrument)) ?? OTHER_OVERDUB;
  const spread = row.exposed ? EXPOSED_SPREAD : basicsRow(level).spread;
  if (mode === 'stack') return spreadAround(middle(STACK), spread);
  if (mode === 'repair') return spreadAround(middle(REPAIR), spread);
  return spreadAround(middle(row.usual) * (mode === 'double' ? DOUBLE_SHARE : 1), spread);
}
