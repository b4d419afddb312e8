import { spawn } from 'node:child_process';
import { root } from './folders.mjs';
import { SetupProblem } from './say.mjs';
import { runQuietly } from './tool.mjs';

// The object store's SDK tells at every start that its coming versions want another Node; the lock file decides that, not a warning.
const quiet = { AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true' };

/** Runs a TypeScript file of the project to its end; its lines are shown only when it fails. */
export async function runToEnd(file, env) {
  const { code, output } = await runQuietly(process.execPath, ['--import', 'tsx', file], {
    ...process.env,
    ...quiet,
    ...env,
  });
  if (code !== 0) throw new SetupProblem(`${file} failed:\n${output.slice(-4000)}`);
  return output;
}

/**
 * Starts the server in a process of its own and waits until it answers. It leaves with us even when we are killed: it hears the
 * channel between us close. It stands outside our terminal's group, so that Ctrl-C reaches us first and we stop things in order.
 */
export async function startServer(env, { show = true } = {}) {
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/dev/serve.ts'], {
    cwd: root,
    env: { ...process.env, ...quiet, ...env },
    stdio: ['ignore', show ? 'inherit' : 'pipe', show ? 'inherit' : 'pipe', 'ipc'],
    detached: true,
  });
  let output = '';
  if (!show) {
    child.stdout.on('data', (chunk) => (output = (output + chunk).slice(-20_000)));
    child.stderr.on('data', (chunk) => (output = (output + chunk).slice(-20_000)));
  }
  const ended = new Promise((resolve) => child.once('exit', (code) => resolve(code)));
  const address = await Promise.race([
    new Promise((resolve) => child.once('message', (message) => resolve(message.address))),
    ended.then((code) => {
      throw new SetupProblem(`The server stopped at its start (exit ${code}).\n${output}`);
    }),
  ]);
  return {
    address,
    ended,
    output: () => output,
    stop: async () => {
      child.kill('SIGTERM');
      await ended;
    },
  };
}
