import type { Attributes } from './scan-xml';

export const coreNamespace = 'http://schemas.microsoft.com/3dmanufacturing/core/2015/02';
const productionNamespace = 'http://schemas.microsoft.com/3dmanufacturing/production/2015/06';

/** Extensions that a model may require: those that say nothing about its shape, and the one that spreads it over several parts. */
const readExtensions = new Set([
  coreNamespace,
  productionNamespace,
  'http://schemas.microsoft.com/3dmanufacturing/material/2015/02',
  'http://schemas.microsoft.com/3dmanufacturing/trianglesets/2021/07',
]);

/** What the prefixes of a model mean. */
export interface Prefixes {
  /** The name of an element of the core specification without its prefix; undefined for any other. */
  findCoreName(name: string): string | undefined;
  /** The part in which the production extension says that an object is. */
  findPath(attributes: Attributes): string | undefined;
  /** A namespace that the model requires and that is not read. */
  readonly unread: string | undefined;
}

/** Reads the declarations of a model's first element. Undefined where that is not one of the core specification. */
export function readPrefixes(name: string, attributes: Attributes): Prefixes | undefined {
  const [prefix, local] = splitName(name);
  const namespaceOf = (key: string): string | undefined => attributes[key === '' ? 'xmlns' : `xmlns:${key}`];
  if (local !== 'model' || namespaceOf(prefix) !== coreNamespace) return undefined;
  const pathKeys = Object.keys(attributes)
    .filter((key) => key.startsWith('xmlns:') && attributes[key] === productionNamespace)
    .map((key) => `${key.slice('xmlns:'.length)}:path`);
  const required = (attributes['requiredextensions'] ?? '').split(/\s+/).filter((key) => key !== '');
  return {
    findCoreName(element) {
      const [own, rest] = splitName(element);
      return own === prefix ? rest : undefined;
    },
    findPath: (given) => pathKeys.map((key) => given[key]).find((path) => path !== undefined),
    unread: required.map((key) => namespaceOf(key) ?? key).find((namespace) => !readExtensions.has(namespace)),
  };
}

function splitName(name: string): [prefix: string, local: string] {
  const colon = name.indexOf(':');
  return colon === -1 ? ['', name] : [name.slice(0, colon), name.slice(colon + 1)];
}
