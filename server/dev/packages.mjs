import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { root, sourcesHash } from './folders.mjs';
import { say, seconds, SetupProblem } from './say.mjs';

const stamp = path.join(root, 'node_modules', '.installed-from');

/** Installs the packages when the lock file changed since the last time (or never was). Node built-ins only. */
export function ensurePackages() {
  const wanted = `${sourcesHash(['package-lock.json'])} node ${process.versions.modules}`;
  if (fs.existsSync(stamp) && fs.readFileSync(stamp, 'utf8') === wanted) return;
  const since = Date.now();
  say('Installing packages from the lock file: one to two minutes the first time …');
  const npm = process.env.npm_execpath;
  const [command, first] = npm?.endsWith('.js') ? [process.execPath, [npm]] : ['npm', []];
  const done = spawnSync(command, [...first, 'ci', '--no-audit', '--no-fund', '--loglevel=error'], {
    cwd: root,
    stdio: 'inherit',
  });
  if (done.status !== 0)
    throw new SetupProblem(
      'The packages could not be installed: see npm’s lines above. Is the npm registry reachable?',
    );
  fs.writeFileSync(stamp, wanted);
  say(`Packages installed in ${seconds(since)}.`);
}
