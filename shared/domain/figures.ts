/** Figures in words for the page and for paper. They depend on no locale, so that every reader of a plan reads the same. */

/** A chance as people say it: 0.83 → `8 in 10`. Near certainty and near impossibility are said as such, never as 10 or 0 in 10. */
export function oddsInWords(chance: number): string {
  if (chance >= 0.995) return 'nearly sure';
  if (chance >= 0.95) return 'over 19 in 20';
  if (chance < 0.05) return 'under 1 in 20';
  return `${Math.min(9, Math.max(1, Math.round(chance * 10)))} in 10`;
}

const SYMBOLS: Readonly<Record<string, string>> = { EUR: '€', USD: '$', GBP: '£', JPY: '¥' };
/** A narrow space that does not break, as SI 5.4.4 and ISO 80000-1 set figures in groups of three. */
const GROUP = '\u202f';

/** 4310.4 and `EUR` → `€ 4 310`: whole units, with the code where the currency has no sign of its own here. */
export function moneyInWords(amount: number, currency: string): string {
  const whole = String(Math.round(Math.abs(amount))).replace(/\B(?=(\d{3})+$)/g, GROUP);
  return `${amount < -0.5 ? '−' : ''}${SYMBOLS[currency] ?? currency}\u00a0${whole}`;
}
