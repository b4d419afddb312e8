// `npm run outside`: the checks against outside values, a line each with its source and standing.
import fs from 'node:fs';
import path from 'node:path';
import { houseFolder } from './folders.mjs';
import { ensurePackages } from './packages.mjs';
import { runCommand, say } from './say.mjs';

await runCommand(async () => {
  ensurePackages();
  const { runTool } = await import('./tool.mjs');
  const report = path.join(houseFolder(), 'outside.jsonl');
  fs.rmSync(report, { force: true });
  const code = await runTool('vitest', ['run', '--project', 'node', '--reporter=dot', 'tests/outside'], {
    OUTSIDE_REPORT: report,
  });
  const lines = fs.existsSync(report) ? fs.readFileSync(report, 'utf8').trim().split('\n') : [];
  const checks = lines
    .map((line) => JSON.parse(line))
    .sort((a, b) => String(a.id).localeCompare(String(b.id), 'en', { numeric: true }));
  for (const one of checks) {
    const figures = `${JSON.stringify(one.got)} against ${JSON.stringify(one.expected)} ${one.unit}`;
    say(`${one.ok ? 'ok    ' : 'FAILED'} ${one.id}  ${one.what}: ${figures}  [${one.standing}] ${one.source}`);
  }
  const failed = checks.filter((one) => !one.ok).length;
  say(`outside: ${checks.length} values, ${new Set(checks.map((one) => one.source)).size} sources, ${failed} failed`);
  if (code !== 0 || failed > 0 || checks.length === 0) process.exitCode = 1;
});
