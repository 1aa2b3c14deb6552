import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import path from 'node:path';
import { ESLint } from 'eslint';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '..');
const tracked = execFileSync('git', ['ls-files', '-co', '--exclude-standard'], {
  cwd: root,
  encoding: 'utf8',
})
  .split('\n')
  .filter((file) => file !== '');
const isCode = (file: string) => /\.(ts|tsx|mjs|js|css)$/.test(file);
const isTest = (file: string) => /\.(test|spec)\.tsx?$/.test(file) || file.startsWith('tests/');
const read = (file: string) => readFileSync(path.join(root, file), 'utf8');
const linesOf = (file: string) => read(file).split('\n').length - 1;

const FILES_IN_FOLDER_MAX = { server: 25, client: 30 };

describe('the layout', () => {
  it('has the agreed folders at the top and nothing beside them but configuration', () => {
    const top = new Set(tracked.map((file) => file.split('/')[0]!));
    const folders = [...top].filter(
      (name) => tracked.some((file) => file.startsWith(`${name}/`)) && !name.startsWith('.'),
    );
    expect(folders.sort()).toEqual(['client', 'jobs', 'server', 'shared', 'tests']);
    for (const name of ['package.json', 'tsconfig.json', 'vite.config.ts', 'README.md', 'DEVELOPERS.md'])
      expect(top).toContain(name);
  });

  it('names files and folders in kebab-case, without exception', () => {
    const bad = tracked
      .filter((file) => /^(client|server|jobs|shared|tests)\//.test(file))
      .filter(
        (file) => !file.split('/').every((part) => /^[a-z0-9]+(-[a-z0-9]+)*(\.[a-z0-9-]+)*$/.test(part)),
      );
    expect(bad).toEqual([]);
  });

  it('keeps files small: 400 lines of source, 600 of tests, median of source at most 80', () => {
    const code = tracked.filter(isCode);
    const long = code.filter((file) => linesOf(file) > (isTest(file) ? 600 : 400));
    expect(long).toEqual([]);
    const sizes = code
      .filter((file) => !isTest(file))
      .map(linesOf)
      .sort((a, b) => a - b);
    expect(sizes[Math.floor(sizes.length / 2)]).toBeLessThanOrEqual(80);
    expect(sizes[Math.floor(sizes.length * 0.9)]).toBeLessThanOrEqual(200);
  });

  it('lets no capability folder swallow its neighbours', () => {
    const counts = new Map<string, number>();
    for (const file of tracked.filter((name) => /^(server|client)\/features\//.test(name) && !isTest(name))) {
      const folder = file.split('/').slice(0, 3).join('/');
      counts.set(folder, (counts.get(folder) ?? 0) + 1);
    }
    const maxOf = (folder: string) =>
      folder.startsWith('server/') ? FILES_IN_FOLDER_MAX.server : FILES_IN_FOLDER_MAX.client;
    const large = [...counts].filter(([folder, count]) => count > maxOf(folder)).map(([folder]) => folder);
    expect(large).toEqual([]);
  });

  it('has no barrels but the models’ index', () => {
    const barrels = tracked
      .filter((file) => /(^|\/)index\.tsx?$/.test(file) && /^(client|server|jobs|shared)\//.test(file))
      .filter((file) => /export \{[^}]*\} from|export \* from/.test(read(file)));
    expect(barrels).toEqual(['server/models/index.ts']);
  });

  it('leaves no markers, no switched-off tests and no commented-out statements of them', () => {
    const marker = new RegExp(
      ['TO' + 'DO', 'FIX' + 'ME', 'HA' + 'CK'].map((word) => `\\b${word}\\b`).join('|'),
    );
    const off = new RegExp(
      `\\b(it|test|describe)\\.(${['sk' + 'ip', 'on' + 'ly', 'to' + 'do'].join('|')})\\(`,
    );
    const found = tracked.filter(isCode).filter((file) => marker.test(read(file)) || off.test(read(file)));
    expect(found).toEqual([]);
  });
});

describe('the import rules', () => {
  // Where files stand needs no types; without them the check takes a second instead of half a minute.
  const eslint = new ESLint({
    cwd: root,
    overrideConfig: {
      languageOptions: { parserOptions: { project: null } },
      rules: Object.fromEntries(
        ['no-floating-promises', 'await-thenable', 'no-misused-promises'].map((rule) => [
          `@typescript-eslint/${rule}`,
          'off',
        ]),
      ),
    },
  });
  const messagesFor = async (file: string, code: string) => {
    const [result] = await eslint.lintText(code, { filePath: path.join(root, file), warnIgnored: true });
    return result!.messages.map((message) => `${message.ruleId ?? 'parse'}: ${message.message}`);
  };

  // A file that exists is borrowed for its place in the tree: the rules look at where a file stands.
  it.each([
    [
      'shared/money.ts',
      "import { env } from '#server/env.ts';\nexport const x = env;\n",
      'import-x/no-restricted-paths',
    ],
    [
      'shared/money.ts',
      "import express from 'express';\nexport const x = express;\n",
      'no-restricted-imports',
    ],
    ['shared/money.ts', 'export const x = Date.now();\n', 'no-restricted-properties'],
    ['shared/money.ts', 'export const x = parseFloat("1");\n', 'house/no-float-measures'],
    [
      'server/models/lot.ts',
      "import { listRegister } from '#server/features/members/member-queries.ts';\nexport const x = listRegister;\n",
      'import-x/no-restricted-paths',
    ],
    [
      'server/features/quotes/quote-queries.ts',
      "import { presentMember } from '#server/features/members/member-presenter.ts';\nexport const x = presentMember;\n",
      'import-x/no-restricted-paths',
    ],
    [
      'server/features/quotes/quote-queries.ts',
      "import Stripe from 'stripe';\nexport const x = Stripe;\n",
      'no-restricted-imports',
    ],
    [
      'client/lib/paths.ts',
      "import { env } from '#server/env.ts';\nexport const x = env;\n",
      'import-x/no-restricted-paths',
    ],
    [
      'client/components/ui/button.tsx',
      "import { Money } from '#client/components/figures/money.tsx';\nexport const x = Money;\n",
      'import-x/no-restricted-paths',
    ],
    [
      'jobs/poll-quotes.ts',
      "import { createApp } from '#server/app.ts';\nexport const x = createApp;\n",
      'import-x/no-restricted-paths',
    ],
    [
      'server/features/quotes/quote-queries.ts',
      "import { startQuotesFake } from '#tests/fakes/quotes/start-quotes-fake.ts';\nexport const x = startQuotesFake;\n",
      'import-x/no-restricted-paths',
    ],
  ])(
    'bite in %s',
    async (file, code, rule) => {
      const messages = await messagesFor(file, code);
      expect(
        messages.some((message) => message.startsWith(`${rule}:`)),
        messages.join('\n'),
      ).toBe(true);
    },
    60_000,
  );

  it('let a lawful import pass', async () => {
    const messages = await messagesFor(
      'server/features/quotes/quote-queries.ts',
      "import { usd } from '#shared/money.ts';\nexport const x = usd;\n",
    );
    expect(messages).toEqual([]);
  }, 60_000);
});
