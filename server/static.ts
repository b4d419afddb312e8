import express, { Router, type RequestHandler } from 'express';
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { AppError } from './errors.ts';

/** Pages of the exported web app, relative to its folder. */
function pagesOf(folder: string): string[] {
  return readdirSync(folder, { recursive: true, encoding: 'utf8' }).filter((file) => file.endsWith('.html'));
}

/** Sources for script-src that let exactly the exported pages' inline scripts run. */
export function inlineScriptHashes(folder: string): string[] {
  const scripts = pagesOf(folder).flatMap((file) => {
    const html = readFileSync(path.join(folder, file), 'utf8');
    return [...html.matchAll(/<script(?![^>]*\bsrc=)[^>]*>([\s\S]*?)<\/script>/g)].map((found) => found[1] ?? '');
  });
  return [...new Set(scripts)].map((script) => `'sha256-${createHash('sha256').update(script).digest('base64')}'`);
}

/** Serves the exported web app: files as they are, and for every address the page of its route, so that each loads on its own. */
export function webApp(folder: string): Router {
  const router = Router();
  const routes = pagesOf(folder)
    .filter((file) => !/^[+_]/.test(path.basename(file)))
    .map((file) => ({ file, ...routeOf(file) }))
    // A page of its own comes before one for any id.
    .sort((a, b) => a.parameters - b.parameters);
  const notFound = path.join(folder, '+not-found.html');

  router.use(
    express.static(folder, {
      index: false,
      redirect: false,
      dotfiles: 'ignore',
      setHeaders: (response, file) => {
        // Names that carry a hash of their content never change; all else is asked for again.
        const hashed = /[.-][0-9a-f]{32}(@\dx)?\.\w+$/.test(path.basename(file));
        response.setHeader('Cache-Control', hashed ? 'public, max-age=31536000, immutable' : 'no-cache');
      },
    }),
  );
  const page: RequestHandler = (request, response, next) => {
    // A missing file is missing, not a page.
    if (!['GET', 'HEAD'].includes(request.method) || path.extname(request.path)) {
      next();
      return;
    }
    response.setHeader('Cache-Control', 'no-cache');
    const route = routes.find(({ pattern }) => pattern.test(request.path));
    if (route) response.sendFile(path.join(folder, route.file));
    else if (existsSync(notFound)) response.status(404).sendFile(notFound);
    else next(new AppError('not-found', 'There is no such page.'));
  };
  router.use(page);
  return router;
}

/** The address a page answers to: groups in brackets vanish, `[id]` is any one step, `[...rest]` any number. */
function routeOf(file: string): { pattern: RegExp; parameters: number } {
  const steps = file
    .replace(/\.html$/, '')
    .split(path.sep)
    .filter((step) => !/^\(.*\)$/.test(step) && step !== 'index');
  const parts = steps.map((step) => {
    if (/^\[\.\.\..+\]$/.test(step)) return '.+';
    if (/^\[.+\]$/.test(step)) return '[^/]+';
    return step.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
  });
  return {
    pattern: new RegExp(`^/${parts.join('/')}/?$`),
    parameters: steps.filter((step) => step.startsWith('[')).length,
  };
}
