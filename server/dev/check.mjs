// `npm run check`: types, lint, format and the unit tests.
import { runChecks } from './checks.mjs';
import { ensurePackages } from './packages.mjs';
import { runCommand } from './say.mjs';
import { runTool } from './tool.mjs';

await runCommand(async () => {
  ensurePackages();
  const { failed } = await runChecks();
  const tests = await runTool('vitest', ['run', '--project', 'node', '--project', 'ui']);
  if (failed.length > 0 || tests !== 0) process.exitCode = 1;
});
