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

/** Runs a program quietly, with this environment and no other; resolves to its exit code and all that it said. */
export function runQuietly(program, args, env) {
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, { cwd: root, env, stdio: ['ignore', 'pipe', 'pipe'] });
    let output = '';
    child.stdout.on('data', (chunk) => (output += chunk));
    child.stderr.on('data', (chunk) => (output += chunk));
    child.on('error', reject);
    child.on('close', (code) => resolve({ code, output }));
  });
}
