import { spawnSync } from 'node:child_process';
import { describe, expect, it } from 'vitest';
import { isAllowed } from '../../../tools/licences/allow-list.mjs';
import { workspaceRoot } from '../../../vite.shared.ts';

describe('third-party licences', () => {
  it('are all on the allow-list, and the committed file lists them as they are', () => {
    const check = spawnSync(process.execPath, ['tools/licences.mjs', '--check'], { cwd: workspaceRoot, encoding: 'utf8' });
    expect({ said: check.stderr, code: check.status }).toEqual({ said: '', code: 0 });
  });

  it.each([
    ['MIT', true],
    ['GPL-3.0-only', false],
    ['AGPL-3.0-or-later', false],
    ['none stated', false],
    ['', false],
    ['(MIT OR GPL-3.0-only)', true],
    ['MIT AND GPL-3.0-only', false],
    ['(MIT AND Zlib) OR GPL-2.0-only', true],
  ])('of the expression "%s": allowed is %s', (expression, expected) => {
    expect(isAllowed(expression)).toBe(expected);
  });
});
