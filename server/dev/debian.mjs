import { spawnSync } from 'node:child_process';
import { say, seconds, SetupProblem } from './say.mjs';

const isRoot = process.getuid?.() === 0;

/** Installs Debian packages when root; otherwise ends with the one line to run. Node built-ins only. */
export function installDebian(packages, why, options = []) {
  const line = `apt-get install -y --no-install-recommends ${packages.join(' ')}`;
  if (!isRoot) throw new SetupProblem(`${why} Run this once, then start again:  sudo ${line}`);
  const since = Date.now();
  say(`${why} Installing ${packages.join(', ')} from Debian …`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const update = spawnSync('apt-get', ['update', '-qq'], { stdio: ['ignore', 'ignore', 'inherit'], env });
  const install = spawnSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', ...options, ...packages], {
    stdio: ['ignore', 'ignore', 'inherit'],
    env,
  });
  if (update.error || install.error || install.status !== 0) {
    throw new SetupProblem(`${packages.join(', ')} could not be installed. Try by hand:  apt-get update && ${line}`);
  }
  say(`Installed in ${seconds(since)}.`);
}
