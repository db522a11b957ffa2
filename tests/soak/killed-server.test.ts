import { randomInt } from 'node:crypto';
import { it } from 'vitest';
import { freshDatabase } from '../support/database';
import { surviveKills } from '../support/killed-server';
import { surviveFullKills } from '../support/killed-start';

it('keeps everything it called saved, once, through twenty kills with -9 while people write', async () => {
  const seed = Number(process.env.SEED ?? randomInt(2 ** 31));
  console.log(`seed ${seed} (SEED=${seed} repeats it)`);
  await surviveKills(await freshDatabase(), 20, seed);
});

it('comes up by itself with all that was saved when start command and database are killed with -9 fifteen times', () =>
  surviveFullKills(15));
