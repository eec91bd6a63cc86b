import { describe, expect, it } from 'vitest';
import { dropUnusedBlueprint, isUsedSelector } from './drop-unused-blueprint';

/** A rule with these selectors after the step; undefined where the step takes it out. */
function pass(...selectors: string[]): string[] | undefined {
  let removed = false;
  const rule = { selectors, remove: () => (removed = true) };
  dropUnusedBlueprint.Rule(rule);
  return removed ? undefined : rule.selectors;
}

describe('the style sheet of the page', () => {
  it('keeps rules of components that we use, and all that are not of Blueprint', () => {
    expect(isUsedSelector('.bp6-button.bp6-intent-primary:hover')).toBe(true);
    expect(isUsedSelector('.statement-rail a')).toBe(true);
    expect(isUsedSelector('html')).toBe(true);
  });
  it('drops rules of components that we do not use, and of the other dark theme', () => {
    expect(pass('.bp6-tree-node')).toBeUndefined();
    expect(pass('.bp6-dark .bp6-button')).toBeUndefined();
  });
  it('keeps the selectors of a rule that can match', () => {
    expect(pass('.bp6-dark .bp6-input', '.bp6-input', '.bp6-tag-input')).toEqual(['.bp6-input']);
  });
  it('a component that is only excluded need not be in use', () => {
    expect(isUsedSelector('.bp6-button:not(.bp6-outlined)')).toBe(true);
  });
});
