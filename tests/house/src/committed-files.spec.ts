import { execFileSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { workspaceRoot } from '../../../vite.shared.ts';

const files = execFileSync('git', ['ls-files', '-z'], { cwd: workspaceRoot, encoding: 'utf8' })
  .split('\0')
  .filter((file) => file !== '' && existsSync(path.join(workspaceRoot, file)));

/** Text of every file that is text; one with a zero byte is not. */
function* readTexts(): Generator<[string, string]> {
  for (const file of files) {
    const bytes = readFileSync(path.join(workspaceRoot, file));
    if (!bytes.includes(0)) yield [file, bytes.toString('utf8')];
  }
}

function findFiles(pattern: RegExp): string[] {
  return [...readTexts()].flatMap(([file, text]) => {
    const match = pattern.exec(text);
    return match ? [`${file}: ${match[0]}`] : [];
  });
}

// Put together here, so that this file does not find itself.
const registries = [
  ['registry', 'npmjs', 'org'],
  ['registry', 'yarnpkg', 'com'],
  ['registry', 'npmmirror', 'com'],
  ['npm', 'pkg', 'github', 'com'],
  ['deb', 'debian', 'org'],
  ['pypi', 'org'],
  ['static', 'crates', 'io'],
];
const homes = ['work', 'root', 'home/\\w+', 'Users/\\w+'];

describe('the committed files', () => {
  it('are there and are read', () => {
    const texts = new Map(readTexts());
    expect(texts.has('package-lock.json')).toBe(true);
    expect(texts.size).toBeGreaterThan(50);
  });

  it('name no host of a package registry', () => {
    expect(findFiles(new RegExp(registries.map((parts) => parts.join('\\.')).join('|')))).toEqual([]);
  });

  it('name no path of one machine', () => {
    expect(findFiles(new RegExp(`(?<![\\w.}*-])/(?:${homes.join('|')})/`))).toEqual([]);
  });

  it('have no address of a download in the lock file', () => {
    const lock = JSON.parse(readFileSync(path.join(workspaceRoot, 'package-lock.json'), 'utf8')) as { packages: Record<string, { resolved?: string; link?: boolean }> };
    expect(Object.entries(lock.packages).filter(([, entry]) => entry.resolved !== undefined && entry.link !== true)).toEqual([]);
  });

  it('let nobody switch a rule or a test off', () => {
    const words = ['eslint-' + 'disable', '@ts-' + 'ignore', '@ts-' + 'nocheck', '\\b(?:it|test|describe)\\.' + '(?:skip|only|todo)\\b'];
    expect(findFiles(new RegExp(words.join('|')))).toEqual([]);
  });

  it('have names in kebab case', () => {
    const exceptions = /^(?:README|DEVELOPERS|THIRD_PARTY_LICENCES)\.md$/;
    const odd = files.filter((file) => /\.(?:ts|tsx|mjs)$/.test(file) && !/^[a-z0-9]+(?:[-.][a-z0-9]+)*$/.test(path.basename(file)) && !exceptions.test(path.basename(file)));
    expect(odd).toEqual([]);
  });
});
