// `npm start`: everything the product needs, set up and running. Node built-ins alone until the packages are there.
import fs from 'node:fs';
import path from 'node:path';
import { houseFolder, sourcesHash } from './folders.mjs';
import { ensurePackages } from './packages.mjs';
import { ensureDatabase, startCluster } from './postgres.mjs';
import { runCommand, say, seconds, SetupProblem } from './say.mjs';

const since = Date.now();
const opened = [];
let closing = null;

/** Closes in the reverse order of opening. */
function close() {
  closing ??= (async () => {
    for (const [name, stop] of opened.reverse()) {
      try {
        await stop();
      } catch (error) {
        say(`${name} did not stop cleanly: ${error.message}`);
      }
    }
  })();
  return closing;
}

await runCommand(async () => {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19))
    throw new SetupProblem(`Node 20.19 or newer is needed; this is ${process.versions.node}.`);
  for (const signal of ['SIGINT', 'SIGTERM']) {
    process.once(signal, () => {
      say('\nStopping …');
      void close().then(() => process.exit(0));
    });
  }
  onlyOnce();
  ensurePackages();

  const env = process.env.DATABASE_URL ? await realServices() : await privateServices();
  if (closing) return;
  const { buildWeb, webFolder } = await import('./web.mjs');
  await buildWeb();
  if (closing) return;
  const { startServer } = await import('./child.mjs');
  const server = await startServer({ NODE_ENV: 'production', ...env, WEB_FOLDER: webFolder });
  opened.push(['The server', server.stop]);
  if (closing) return void (await server.stop());
  say('');
  say(`Cinderpath is at ${server.address}   (ready in ${seconds(since)}; Ctrl-C stops it)`);
  if (env.DEMO_PASSWORD) await sayAccounts(server.address);
  const code = await server.ended;
  if (!closing) {
    await close();
    throw new SetupProblem(`The server ended by itself (exit ${code}).`);
  }
  await closing;
});
if (!closing) await close();

/** Two starts in one folder would stop each other's database. */
function onlyOnce() {
  const file = path.join(houseFolder(), 'start.pid');
  const other = fs.existsSync(file) ? Number(fs.readFileSync(file, 'utf8')) : 0;
  if (other && other !== process.pid) {
    let command = '';
    try {
      command = fs.readFileSync(`/proc/${other}/cmdline`, 'utf8');
    } catch {
      // It is gone: killed, or the machine restarted.
    }
    if (command.includes('server/dev/start.mjs'))
      throw new SetupProblem(`Cinderpath runs from this folder already (process ${other}). Stop it first.`);
  }
  fs.writeFileSync(file, String(process.pid));
  opened.push(['The lock', () => fs.rmSync(file, { force: true })]);
}

/** Databases and files of somebody else's: migrated, never seeded. */
async function realServices() {
  for (const name of ['DATABASE_OWNER_URL', 'S3_BUCKET', 'SESSION_SECRET']) {
    if (!process.env[name])
      throw new SetupProblem(`With DATABASE_URL set, ${name} is needed too: see README.md, “Real services”.`);
  }
  const { runToEnd } = await import('./child.mjs');
  await runToEnd('db/migrate.ts', {});
  return {};
}

/** A private cluster and a stand-in object store on loopback, with the demo plants filled in once. */
async function privateServices() {
  const cluster = await startCluster({ kind: 'product' });
  opened.push(['The database', cluster.stop]);
  const { startFakeS3 } = await import('./fake-s3.mjs');
  const s3 = await startFakeS3({ folder: 'files' });
  opened.push(['The object store', s3.stop]);
  const { made } = await ensureDatabase(cluster, 'cinderpath');
  const env = {
    DATABASE_URL: cluster.appUrl('cinderpath'),
    DATABASE_OWNER_URL: cluster.ownerUrl('cinderpath'),
    SESSION_SECRET: cluster.secrets.session,
    DEMO_PASSWORD: cluster.secrets.demo,
    ...s3.env,
  };
  const { prepareDatabase } = await import('./prepare.mjs');
  const stampFile = path.join(cluster.folder, 'prepared');
  const stamp = sourcesHash(['db', 'server/demo', 'package-lock.json']);
  if (made || !fs.existsSync(stampFile) || fs.readFileSync(stampFile, 'utf8') !== stamp) {
    await prepareDatabase(env);
    fs.writeFileSync(stampFile, stamp);
  }
  return env;
}

async function sayAccounts(address) {
  const answer = await fetch(`${address}/api/welcome`);
  const { demo } = await answer.json();
  if (!demo) return;
  say('');
  say(`Demo plants are filled in. Sign in as (password for all: ${demo.password}):`);
  for (const { mail, role, plant } of demo.accounts) say(`  ${mail.padEnd(34)} ${role.padEnd(24)} ${plant}`);
}
