/**
 * The parts of Blueprint's style sheet that our pages use, by the first word of a class behind its `bp6-`.
 * Whoever uses another of its components adds the words of that component here.
 */
const usedWords = new Set([
  ...['active', 'align', 'button', 'dialog', 'disabled', 'fill', 'fixed', 'focus', 'form', 'heading', 'html', 'icon', 'input', 'intent', 'label', 'large'],
  ...['loading', 'medium', 'minimal', 'overlay', 'popover', 'portal', 'select', 'small', 'spinner', 'svg', 'text', 'transition'],
]);

/** A selector can match only where all of its Blueprint classes are in use. */
export function isUsedSelector(selector: string): boolean {
  // What is only excluded by `:not(…)` need not be in use.
  const wanted = selector.replace(/:not\([^()]*\)/g, '');
  return [...wanted.matchAll(/\.bp6-([a-z]+)/g)].every(([, word]) => usedWords.has(word ?? ''));
}

interface StyleRule {
  selectors: string[];
  remove: () => unknown;
}

/**
 * A step of the build. Blueprint comes as one style sheet of half a megabyte, most of it for components and a dark theme that are not ours
 * (ours is in tokens.css), and a browser reads all of a style sheet before it paints.
 */
export const dropUnusedBlueprint = {
  postcssPlugin: 'drop-unused-blueprint',
  Rule(rule: StyleRule): void {
    const used = rule.selectors.filter(isUsedSelector);
    if (used.length === 0) rule.remove();
    else if (used.length < rule.selectors.length) rule.selectors = used;
  },
};
