import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { ESLint } from 'eslint';
import { configs } from 'typescript-eslint';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '..');
const floors = ['app', 'components', 'strategy', 'server', 'db', 'shared', 'assets', 'tests'];
const tracked = execFileSync('git', ['ls-files'], { cwd: root, encoding: 'utf8' }).trim().split('\n');

describe('the house', () => {
  it('has the floors it was drawn with at its top, and beside them only what tools insist on', () => {
    const folders = new Set(tracked.filter((file) => file.includes('/')).map((file) => file.split('/')[0] ?? ''));
    expect([...folders].filter((name) => !floors.includes(name)).sort()).toEqual(['.ci', 'public']);
    expect(floors.filter((name) => !folders.has(name))).toEqual([]);
  });

  it.each(floors)('says what %s/ is in a page at most', (floor) => {
    const lines = readFileSync(path.join(root, floor, 'README.md'), 'utf8')
      .trim()
      .split('\n');
    expect(lines.length).toBeGreaterThan(2);
    expect(lines.length).toBeLessThanOrEqual(60);
  });

  it('keeps the guide and the README free of a path of one machine', () => {
    for (const file of ['README.md', 'DEVELOPERS.md']) {
      expect(readFileSync(path.join(root, file), 'utf8')).not.toMatch(/\/(work|root|home|tmp)\//);
    }
  });

  it('pins every package to one version', () => {
    const { dependencies, devDependencies } = JSON.parse(
      readFileSync(path.join(root, 'package.json'), 'utf8'),
    ) as Record<
      'dependencies' | 'devDependencies', // npm's own file
      Record<string, string>
    >;
    const loose = Object.entries({ ...dependencies, ...devDependencies }).filter(
      ([, version]) => !/^\d+\.\d+\.\d+$/.test(version),
    );
    expect(loose).toEqual([]);
  });
});

describe('imports', () => {
  // The project's own rules, but for those that need the types of the whole program: none of the directions does.
  const eslint = new ESLint({ cwd: root, overrideConfig: [configs.disableTypeChecked] });
  // Written as if in a file that stands there, since the rules depend on the floor.
  it.each([
    ['strategy/units/parse.ts', '../../shared/limits.ts'],
    ['strategy/units/parse.ts', 'node:fs'],
    ['strategy/units/parse.ts', 'zod'],
    ['shared/limits.ts', '../server/config.ts'],
    ['shared/limits.ts', 'drizzle-orm'],
    ['db/migrate.ts', '../server/config.ts'],
    ['server/config.ts', '../components/theme/roles.ts'],
    ['components/ui/button.tsx', '@/server/config.ts'],
    ['components/ui/button.tsx', 'mathjs'],
    ['app/index.tsx', '@/db/database.ts'],
  ])(
    'never go up: %s may not import %s',
    async (file, from) => {
      const [result] = await eslint.lintText(`import * as above from '${from}';\nexport { above };\n`, {
        filePath: path.join(root, file),
      });
      const rules = result?.messages.map(({ ruleId }) => ruleId);
      expect(rules).toContain('no-restricted-imports');
    },
    120_000,
  );

  it('may go down', async () => {
    const [result] = await eslint.lintText(`export { limits } from './limits.ts';\n`, {
      filePath: path.join(root, 'shared/errors.ts'),
    });
    expect(result?.messages).toEqual([]);
  });
});
