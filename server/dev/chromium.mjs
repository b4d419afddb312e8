import fs from 'node:fs';
import { installDebian } from './debian.mjs';

export const chromium = process.env.CHROMIUM ?? '/usr/bin/chromium';

/** Makes sure of Debian's Chromium for the browser tests. */
export function ensureChromium() {
  if (!fs.existsSync(chromium)) installDebian(['chromium'], 'Chromium is needed for the browser tests and not here.');
}
