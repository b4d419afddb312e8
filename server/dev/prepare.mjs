import { runToEnd } from './child.mjs';
import { say, seconds } from './say.mjs';

/** Migrates, and fills in the demo plants; both know when there is nothing left to do. */
export async function prepareDatabase(env) {
  const since = Date.now();
  await runToEnd('db/migrate.ts', env);
  await runToEnd('server/demo/seed.ts', env);
  say(`Database migrated and demo plants looked after in ${seconds(since)}.`);
}
