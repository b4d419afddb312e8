import { spawn } from 'node:child_process';
import path from 'node:path';
import { root } from './folders.mjs';

/** Runs an installed package's program with the project as its folder; resolves to the exit code. */
export function runTool(program, args, env = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(path.join(root, 'node_modules/.bin', program), args, {
      cwd: root,
      env: { ...process.env, ...env },
      stdio: ['ignore', 'inherit', 'inherit'],
    });
    child.on('error', reject);
    child.on('close', (code) => resolve(code ?? 1));
  });
}
