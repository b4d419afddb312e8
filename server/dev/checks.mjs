import { runTool } from './tool.mjs';
import { say, seconds } from './say.mjs';

const offline = { CI: '1', EXPO_OFFLINE: '1', EXPO_NO_TELEMETRY: '1' };

/** Types, lint, format, in this order; names those that failed. */
export async function runChecks() {
  // Writes the types of the routes, which the compiler needs.
  await runTool('expo', ['customize', 'tsconfig.json'], offline);
  const failed = [];
  for (const [name, program, args] of [
    ['types', 'tsc', ['--noEmit']],
    ['types of strategy/ behind its fence', 'tsc', ['--noEmit', '-p', 'strategy']],
    ['lint', 'eslint', ['--max-warnings', '0', '.']],
    ['format', 'prettier', ['--check', '--log-level', 'warn', '.']],
  ]) {
    const since = Date.now();
    const code = await runTool(program, args);
    say(`${code === 0 ? 'ok    ' : 'FAILED'} ${name} (${seconds(since)})`);
    if (code !== 0) failed.push(name);
  }
  return { passed: 4 - failed.length, failed };
}
