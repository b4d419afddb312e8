import { readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '../..');
const shipped = readdirSync(path.join(root, 'assets/fonts')).filter((name) => name.endsWith('.ttf'));

describe('the shipped letters', () => {
  it('are there in the five weights the type uses', () => expect(shipped).toHaveLength(5));

  it.each(shipped)('%s is the very file of the package that the licence came with', (name) => {
    const [family, style] = name.replace('.ttf', '').split('_');
    const folder = family === 'BarlowCondensed' ? 'barlow-condensed' : 'barlow';
    const original = path.join(root, 'node_modules/@expo-google-fonts', folder, style ?? '', name);
    expect(readFileSync(path.join(root, 'assets/fonts', name)).equals(readFileSync(original))).toBe(true);
  });
});
