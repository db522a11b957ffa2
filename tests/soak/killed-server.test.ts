import { randomInt } from 'node:crypto';
import { it } from 'vitest';
import { freshDatabase } from '../support/database';
import { surviveKills } from '../support/killed-server';

it('keeps everything it called saved, once, through twenty kills with -9 while people write', async () => {
  const seed = Number(process.env.SEED ?? randomInt(2 ** 31));
  console.log(`seed ${seed} (SEED=${seed} repeats it)`);
  await surviveKills(await freshDatabase(), 20, seed);
});
