// `npm test`: sets up all of its own and runs every check and test, browser ones included. Its last line says how many passed.
import fs from 'node:fs';
import path from 'node:path';
import { ensureChromium } from './chromium.mjs';
import { houseFolder } from './folders.mjs';
import { ensurePackages } from './packages.mjs';
import { startCluster } from './postgres.mjs';
import { runCommand, say, seconds } from './say.mjs';

const since = Date.now();

await runCommand(async () => {
  ensurePackages();
  ensureChromium();
  const cluster = await startCluster({ kind: 'test' });
  const stop = () => cluster.destroy();
  for (const signal of ['SIGINT', 'SIGTERM']) {
    process.once(signal, () => {
      stop();
      process.exit(1);
    });
  }
  try {
    const { runChecks } = await import('./checks.mjs');
    const checks = await runChecks();
    const { buildWeb } = await import('./web.mjs');
    await buildWeb();
    const { runTool } = await import('./tool.mjs');
    const report = path.join(houseFolder(), 'tests.json');
    fs.rmSync(report, { force: true });
    const code = await runTool(
      'vitest',
      ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${report}`],
      {
        TEST_SUPER_URL: cluster.superUrl('postgres'),
        TEST_OWNER_URL: cluster.ownerUrl('postgres'),
        TEST_APP_URL: cluster.appUrl('postgres'),
      },
    );
    const tests = fs.existsSync(report)
      ? JSON.parse(fs.readFileSync(report, 'utf8'))
      : { numPassedTests: 0, numFailedTests: 1 };
    const skipped = (tests.numPendingTests ?? 0) + (tests.numTodoTests ?? 0);
    // A file that could not even be loaded, or an unhandled rejection, fails the run without failing a test.
    const broken = code !== 0 && tests.numFailedTests === 0 ? 1 : 0;
    const failed = tests.numFailedTests + broken + checks.failed.length;
    say(
      `\nEverything took ${seconds(since)}.${checks.failed.length ? ` Failed checks: ${checks.failed.join(', ')}.` : ''}`,
    );
    say(`${tests.numPassedTests + checks.passed} passed, ${failed} failed${skipped ? `, ${skipped} skipped` : ''}`);
    if (failed > 0) process.exitCode = 1;
  } finally {
    stop();
  }
});
