import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

const root = path.resolve(import.meta.dirname, '..');
const read = (file: string) => readFileSync(path.join(root, file), 'utf8');

/** First cells of the table under a heading of DEVELOPERS.md. */
function namesIn(heading: string): string[] {
  const part = read('DEVELOPERS.md').split(`\n## ${heading}\n`)[1]?.split('\n## ')[0] ?? '';
  const rows = part.split('\n').filter((row) => row.startsWith('| '));
  return rows.slice(2).map((row) => row.split('|')[1]?.trim() ?? '');
}

/** What the files of a folder declare under `pattern`, one name a file at most. */
function declared(folder: string, pattern: RegExp): string[] {
  return readdirSync(path.join(root, folder))
    .filter((file) => file.endsWith('.ts'))
    .flatMap((file) => read(path.join(folder, file)).match(pattern)?.[1] ?? []);
}

describe('DEVELOPERS.md', () => {
  it('lists every job', () => {
    const jobs = declared('jobs', /defineJob\(\{\s*name: '([a-z-]+)'/);
    expect(jobs.length).toBeGreaterThan(5);
    expect(namesIn('Jobs').sort()).toEqual(jobs.sort());
  });

  it('lists every mail', () => {
    const mails = readdirSync(path.join(root, 'server/emails'))
      .filter((file) => read(path.join('server/emails', file)).includes('= defineMail('))
      .map((file) => path.basename(file, '.ts'));
    expect(mails.length).toBeGreaterThan(5);
    expect(namesIn('Mails').sort()).toEqual(mails.sort());
  });
});

describe('README.md', () => {
  it('names only commands that there are', () => {
    const { scripts } = JSON.parse(read('package.json')) as { scripts: Record<string, string> };
    const named = [...read('README.md').matchAll(/npm run ([a-z:-]+)/g)].map((match) => match[1] ?? '');
    expect(named).toEqual(expect.arrayContaining(['make-staff', 'picture']));
    expect(named.filter((name) => !(name in scripts))).toEqual([]);
  });
});
