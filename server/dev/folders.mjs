import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');

/**
 * Everything the two commands make for themselves: databases, stored files, caches. Git-ignored; deleting it starts anew.
 * CINDERPATH_HOUSE names another folder, so that the commands can be tested beside a product that runs.
 */
export const house = path.resolve(process.env.CINDERPATH_HOUSE ?? path.join(root, '.house'));

export function houseFolder(...parts) {
  const folder = path.join(house, ...parts);
  fs.mkdirSync(folder, { recursive: true });
  return folder;
}

/** SHA-256 over the names and contents of files and folders, given relative to the root. */
export function sourcesHash(entries) {
  const hash = createHash('sha256');
  const visit = (relative) => {
    const full = path.join(root, relative);
    if (!fs.existsSync(full)) return;
    if (fs.statSync(full).isDirectory()) {
      for (const name of fs.readdirSync(full).sort()) if (!name.startsWith('.')) visit(path.join(relative, name));
      return;
    }
    hash.update(relative).update('\0').update(fs.readFileSync(full)).update('\0');
  };
  entries.forEach(visit);
  return hash.digest('hex');
}
