import fs from 'node:fs';
import path from 'node:path';
import { houseFolder, root, sourcesHash } from './folders.mjs';
import { say, seconds, SetupProblem } from './say.mjs';
import { runQuietly } from './tool.mjs';

const sources = [
  'app',
  'components',
  'strategy',
  'shared',
  'public',
  'assets',
  'app.json',
  'metro.config.cjs',
  'package-lock.json',
  'tsconfig.json',
  'babel.config.cjs',
];
export const webFolder = path.join(root, 'dist');
const stamp = path.join(webFolder, '.built-from');

/** Exports the web app into dist/ when its sources changed. The old one stays in place until the new one is whole. */
export async function buildWeb() {
  const wanted = sourcesHash(sources);
  if (fs.existsSync(stamp) && fs.readFileSync(stamp, 'utf8') === wanted) return;
  const since = Date.now();
  say('Building the web app: about two minutes the first time, seconds later …');
  const next = path.join(root, 'build', 'web');
  fs.rmSync(next, { recursive: true, force: true });
  const tell = setInterval(() => say(`  still building, ${seconds(since)}`), 20_000);
  const { code, output } = await runQuietly(
    process.execPath,
    [path.join(root, 'node_modules/expo/bin/cli'), 'export', '-p', 'web', '--output-dir', next],
    // The bundler's cache stays inside the project: another person's cache in the shared folder could not be written.
    {
      ...process.env,
      CI: '1',
      EXPO_OFFLINE: '1',
      EXPO_NO_TELEMETRY: '1',
      NODE_ENV: 'production',
      TMPDIR: houseFolder('bundler'),
    },
  );
  clearInterval(tell);
  if (code !== 0) throw new SetupProblem(`The web app could not be built:\n${output.slice(-4000)}`);
  fs.writeFileSync(path.join(next, '.built-from'), wanted);
  fs.rmSync(webFolder, { recursive: true, force: true });
  fs.renameSync(next, webFolder);
  say(`Web app built in ${seconds(since)}.`);
}
