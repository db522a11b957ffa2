import { it } from 'vitest';
import { freshDatabase } from '../support/database';
import { surviveKills } from '../support/killed-server';
import { surviveFullKills } from '../support/killed-start';

it('keeps everything it called saved, once, when it is killed with -9 while people write', async () => {
  const seed = 20_270_308;
  console.log(`seed ${seed}`);
  await surviveKills(await freshDatabase(), 3, seed);
});

it('comes up by itself with all that was saved when start command and database are killed with -9 twice', () => surviveFullKills(2));
