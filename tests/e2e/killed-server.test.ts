import { it } from 'vitest';
import { freshDatabase } from '../support/database';
import { surviveKills } from '../support/killed-server';

it('keeps everything it called saved, once, when it is killed with -9 while people write', async () => {
  const seed = 20_270_308;
  console.log(`seed ${seed}`);
  await surviveKills(await freshDatabase(), 3, seed);
});
