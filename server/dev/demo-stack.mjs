import fs from 'node:fs';
import { startServer } from './child.mjs';
import { startFakeS3 } from './fake-s3.mjs';
import { houseFolder } from './folders.mjs';
import { dropDatabase, ensureDatabase } from './postgres.mjs';
import { prepareDatabase } from './prepare.mjs';
import { webFolder } from './web.mjs';

const password = 'demo-plate-2207';

/** The whole product on a database and object store of its own, with the demo plants, for browser tests and screenshots. */
export async function startDemoStack({ cluster, database }) {
  const folder = `files-${database}`;
  fs.rmSync(houseFolder(folder), { recursive: true, force: true });
  await ensureDatabase(cluster, database);
  const s3 = await startFakeS3({ folder });
  const env = {
    NODE_ENV: 'production',
    DATABASE_URL: cluster.appUrl(database),
    DATABASE_OWNER_URL: cluster.ownerUrl(database),
    SESSION_SECRET: cluster.secrets.session,
    DEMO_PASSWORD: password,
    WEB_FOLDER: webFolder,
    HOST: '127.0.0.1',
    PORT: '0',
    ...s3.env,
  };
  await prepareDatabase(env);
  const server = await startServer(env, { show: false });
  return {
    address: server.address,
    password,
    superUrl: cluster.superUrl(database),
    output: server.output,
    stop: async () => {
      await server.stop();
      await s3.stop();
      await dropDatabase(cluster, database);
      fs.rmSync(houseFolder(folder), { recursive: true, force: true });
    },
  };
}
