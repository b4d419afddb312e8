import { startCluster } from '../../server/dev/postgres.mjs';

/** Starts the throw-away cluster once for all test files (`npm test` has started it already and says where). */
export default async function setup() {
  if (process.env.TEST_OWNER_URL && process.env.TEST_APP_URL && process.env.TEST_SUPER_URL) return;
  const cluster = await startCluster({ kind: 'test' });
  process.env.TEST_SUPER_URL = cluster.superUrl('postgres');
  process.env.TEST_OWNER_URL = cluster.ownerUrl('postgres');
  process.env.TEST_APP_URL = cluster.appUrl('postgres');
  // Left running: a watcher's next run takes it as it is, and `npm test` stops its own.
}
