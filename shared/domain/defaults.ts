/**
 * Defaults of a production file. A figure of the production always wins.
 * Source: the production-file contract; breaks, meals and turnaround follow common practice (no source) and keep within
 * Directive 2003/88/EC art. 3–4 (11 h daily rest, a break when the day exceeds 6 h) and California Labor Code 512 (a meal within 5 h).
 */
export const DEFAULT_RULES = {
  step: 5,
  mealAfter: 300,
  meal: 45,
  breakAfter: 120,
  break: 15,
  wrap: 45,
  listen: 30,
  reserve: 0.15,
  turnaround: 660,
  changeover: 0,
  oneRoomPerSong: true,
} as const;

export const DEFAULT_WEIGHTS = {
  waiting: 1,
  changeover: 1,
  day: 120,
  overtime: 2,
  call: 15,
  maybe: 2,
  should: 2000,
  nice: 500,
} as const;

export const DEFAULT_CURRENCY = 'EUR';
