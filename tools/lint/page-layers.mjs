import path from 'node:path';

/**
 * The layers of the web application, by folder below apps/web/src: what a file in one may import from the others.
 * A feature sees itself, `lib` and `components`, and no other feature: routes compose features. Tags and path patterns
 * can't say that, because a relative path means another folder at another depth.
 * @type {Record<string, string[]>}
 */
const mayImport = {
  lib: [],
  components: ['lib', 'styles'],
  viewer: ['components', 'lib', 'styles'],
  features: ['components', 'lib', 'styles'],
};

const source = `${path.sep}apps${path.sep}web${path.sep}src${path.sep}`;

/** @param {string} file @returns {{ layer: string, feature: string | undefined } | undefined} */
function findPlace(file) {
  const at = file.lastIndexOf(source);
  if (at < 0) return undefined;
  const [layer = '', noun] = file.slice(at + source.length).split(path.sep);
  return { layer, feature: layer === 'features' ? noun : undefined };
}

/** @param {string} file @param {string} imported @returns {string | undefined} what is wrong with it */
export function findFault(file, imported) {
  const from = findPlace(file);
  if (from === undefined || !imported.startsWith('.')) return undefined;
  const to = findPlace(path.resolve(path.dirname(file), imported));
  const allowed = mayImport[from.layer];
  if (to === undefined || allowed === undefined) return undefined;
  if (from.feature !== undefined && to.layer === 'features') {
    return from.feature === to.feature ? undefined : `The feature "${from.feature}" must not know the feature "${to.feature}": routes compose features.`;
  }
  if (from.layer === to.layer || allowed.includes(to.layer)) return undefined;
  return `${from.layer} must not import from ${to.layer}: routes and the app compose what stands below them.`;
}

/** @type {import('eslint').Rule.RuleModule} */
export const pageLayers = {
  meta: { type: 'problem', docs: { description: 'keep the layers of the web application apart' }, schema: [] },
  create(context) {
    /** @param {import('estree').Node | null | undefined} node */
    const check = (node) => {
      if (node?.type !== 'Literal' || typeof node.value !== 'string') return;
      const message = findFault(context.filename, node.value);
      if (message !== undefined) context.report({ node, message });
    };
    return {
      ImportDeclaration: (node) => check(node.source),
      ImportExpression: (node) => check(node.source),
      ExportNamedDeclaration: (node) => check(node.source),
      ExportAllDeclaration: (node) => check(node.source),
    };
  },
};
