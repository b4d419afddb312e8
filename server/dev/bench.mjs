// `npm run bench -- [case …]`: each case of tests/bench on its own, one line of JSON each.
import fs from 'node:fs';
import path from 'node:path';
import { root } from './folders.mjs';
import { ensurePackages } from './packages.mjs';
import { runCommand, say } from './say.mjs';

await runCommand(async () => {
  ensurePackages();
  const { runTool } = await import('./tool.mjs');
  const folder = path.join(root, 'tests/bench');
  const ending = '.bench.ts';
  const known = fs
    .readdirSync(folder)
    .filter((file) => file.endsWith(ending))
    .map((file) => file.slice(0, -ending.length))
    .sort();
  const asked = process.argv.slice(2);
  const unknown = asked.filter((name) => !known.includes(name));
  if (unknown.length > 0) {
    say(`No such case: ${unknown.join(', ')}. There are: ${known.join(', ')}.`);
    process.exitCode = 1;
    return;
  }
  // One after the other, each in a process of its own: no case warms up another's code.
  for (const name of asked.length === 0 ? known : asked) {
    const code = await runTool('tsx', [path.join(folder, `${name}${ending}`)]);
    if (code !== 0) process.exitCode = 1;
  }
});
