import { runTool } from './tool.mjs';
import { say, seconds } from './say.mjs';

const offline = { CI: '1', EXPO_OFFLINE: '1', EXPO_NO_TELEMETRY: '1' };

/** Types, lint, format; names those that failed. */
export async function runChecks() {
  // Writes the types of the routes, which the compiler needs.
  await runTool('expo', ['customize', 'tsconfig.json'], offline);
  const failed = [];
  const check = async (name, program, args) => {
    const since = Date.now();
    const code = await runTool(program, args);
    say(`${code === 0 ? 'ok    ' : 'FAILED'} ${name} (${seconds(since)})`);
    if (code !== 0) failed.push(name);
  };
  // Lint takes as long as all others: two side by side, one a core.
  await Promise.all([
    check('lint', 'eslint', ['--max-warnings', '0', '.']),
    (async () => {
      await check('types', 'tsc', ['--noEmit']);
      await check('types of strategy/ behind its fence', 'tsc', ['--noEmit', '-p', 'strategy']);
      await check('format', 'prettier', ['--check', '--log-level', 'warn', '.']);
    })(),
  ]);
  return { passed: 4 - failed.length, failed };
}
