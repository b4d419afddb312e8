// `npm run deep`: the long tier, the same tests of strategy/ and of the reference with as many cases as an evening holds.
import { ensurePackages } from './packages.mjs';
import { runCommand } from './say.mjs';

await runCommand(async () => {
  ensurePackages();
  const { runTool } = await import('./tool.mjs');
  const chosen = process.argv.slice(2);
  process.exitCode = await runTool(
    'vitest',
    [
      'run',
      '--project',
      'node',
      '--testTimeout=3600000',
      ...(chosen.length > 0 ? chosen : ['tests/strategy', 'tests/reference']),
    ],
    { CINDERPATH_DEEP: '1' },
  );
});
