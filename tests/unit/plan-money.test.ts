import { describe, expect, it } from 'vitest';
import { moneyInWords, oddsInWords } from '../../shared/domain/figures';
import { hasPrices, planMoney } from '../../shared/planner/money';
import { sampleFile, samplePlan } from '../factories/plan-sample';

describe('what a plan costs in money', () => {
  it('adds room-days, overtime, fees and hire, as reckoned by hand', () => {
    // Room A on two days at 550, Room B on one at 200. Room A is standard for 8 h: Monday lasts 10:00 to 17:05 (none beyond),
    // Tuesday 10:00 to 19:00, 1 h beyond at 70. Mara: two calls at 50, and 75 + 30 minutes at 20 an hour. The organ: 180, used once.
    expect(planMoney(sampleFile(), samplePlan())).toEqual({
      currency: 'EUR',
      rooms: 550 + 550 + 200,
      overtime: 70,
      fees: 2 * 50 + (105 / 60) * 20,
      hire: 180,
      total: 1300 + 70 + 135 + 180,
    });
  });

  it('counts the hours of somebody with time off only while they are there', () => {
    const file = sampleFile();
    file.people.find(({ id }) => id === 'lys')!.fee = { perHour: 60 };
    // Lys stays 13:00 to 13:50 and 15:30 to 16:00; the 100 minutes between are time off (away: 60).
    expect(planMoney(file, samplePlan()).fees - planMoney(sampleFile(), samplePlan()).fees).toBe(80);
  });

  it('hires nothing for a pass that is not placed, and knows when there are no prices', () => {
    const plan = samplePlan();
    expect(planMoney(sampleFile(), { ...plan, items: plan.items.filter(({ id }) => id !== 's3-organ') }).hire).toBe(0);
    expect(hasPrices(sampleFile())).toBe(true);
    const free = { ...sampleFile(), gear: [] };
    free.rooms.forEach((room) => delete room.price);
    free.people.forEach((person) => delete person.fee);
    expect(hasPrices(free)).toBe(false);
  });
});

describe('figures in words', () => {
  it('writes money in whole units, grouped', () => {
    expect(moneyInWords(4310.4, 'EUR')).toBe('€\u00a04\u202f310');
    expect(moneyInWords(1234567, 'NOK')).toBe('NOK\u00a01\u202f234\u202f567');
    expect(moneyInWords(0, 'USD')).toBe('$\u00a00');
  });

  it('says odds as people do and never promises', () => {
    expect([0.83, 0.5, 0.96, 1, 0.02, 0.07, 0.94].map(oddsInWords)).toEqual([
      '8 in 10',
      '5 in 10',
      'over 19 in 20',
      'nearly sure',
      'under 1 in 20',
      '1 in 10',
      '9 in 10',
    ]);
  });
});
