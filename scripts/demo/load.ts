import { playBrook07 } from './brook-07';
import { playFord11 } from './ford-11';
import { createDemoPeople, listDemoAccounts } from './people';
import { DAY } from './play-trial';
import { playSpring04 } from './spring-04';
import { playWell02 } from './well-02';

/**
 * Loads the demonstration into a fresh installation: people, sites and trials brought to their states by the
 * application's own commands, at times relative to now. Throws where something of it is refused.
 */
export async function loadDemo(now = Date.now()): Promise<void> {
  const { people, sites } = await createDemoPeople(now - 230 * DAY);
  await playWell02(people, sites, now);
  await playFord11(people, sites, now);
  await playSpring04(people, sites, now);
  await playBrook07(people, sites, now);
  await listDemoAccounts(people);
}
