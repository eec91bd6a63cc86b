import { existsSync, readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { inCheckout } from '../setup/checkout.mjs';

/**
 * @typedef {object} LockEntry
 * @property {string} [version]
 * @property {string} [license]
 * @property {boolean} [dev]
 * @property {boolean} [devOptional]
 * @property {boolean} [optional]
 * @property {boolean} [link]
 */

/** @typedef {{ name: string, version: string, licence: string, notice: string }} ThirdParty */

/** Older packages say it in other shapes than one SPDX expression. @param {unknown} said @returns {string | undefined} */
function readLicence(said) {
  if (typeof said === 'string') return said;
  if (Array.isArray(said)) return said.map(readLicence).filter(Boolean).join(' OR ') || undefined;
  if (typeof said === 'object' && said !== null && 'type' in said && typeof said.type === 'string') return said.type;
  return undefined;
}

/** The lines in which the authors of a package name themselves. @param {string} folder */
function readNotice(folder) {
  if (!existsSync(folder)) return '';
  const file = readdirSync(folder).filter((name) => /^(licen[cs]e|copying|notice)(\.(md|txt|markdown))?$/i.test(name)).sort()[0];
  if (file === undefined) return '';
  const lines = readFileSync(path.join(folder, file), 'utf8').split('\n').map((line) => line.replace(/^[\s>*#/-]+/, '').replaceAll(/\s+/g, ' ').split(/ \S+\.ttf: /, 1).join('').trim());
  const notices = lines.filter((line) => /^(copyright|©)[\s:(©\d]/i.test(line) && !/^copyright (notice|owner|holder|license|statement|and)/i.test(line) && !/\[(yyyy|name)/i.test(line));
  return [...new Set(notices)].slice(0, 3).join('; ').replaceAll('|', '\\|');
}

/** Every package that is there at run time, of the lock file; what depends on the machine is there on some and not on others. @returns {ThirdParty[]} */
export function listThirdParties() {
  /** @type {{ packages: Record<string, LockEntry> }} */
  const lock = JSON.parse(readFileSync(inCheckout('package-lock.json'), 'utf8'));
  const found = Object.entries(lock.packages).flatMap(([place, entry]) => {
    if (!place.includes('node_modules/') || entry.dev === true || entry.devOptional === true || entry.link === true) return [];
    const name = place.slice(place.lastIndexOf('node_modules/') + 'node_modules/'.length);
    const folder = inCheckout(place);
    const manifest = path.join(folder, 'package.json');
    /** @type {{ license?: unknown, licenses?: unknown }} */
    const own = existsSync(manifest) ? JSON.parse(readFileSync(manifest, 'utf8')) : {};
    const licence = entry.license ?? readLicence(own.license) ?? readLicence(own.licenses) ?? 'none stated';
    // The same list on every machine: optional packages are of one machine or another, so their files are not read.
    return [{ name, version: entry.version ?? '', licence, notice: entry.optional === true ? '' : readNotice(folder) }];
  });
  const unique = new Map(found.map((party) => [`${party.name}@${party.version}`, party]));
  return [...unique.values()].sort((a, b) => (a.name === b.name ? (a.version < b.version ? -1 : 1) : a.name < b.name ? -1 : 1));
}
